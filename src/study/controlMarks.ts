import { type Control, coordinatesOn, type Mark, type PointCoordinates } from '../control/index.js';
import type { OccupationError } from '../errors/index.js';
import { combinedFactor, type Projection } from '../geodesy/index.js';
import { type CoordinateSystem, systemOf } from '../logs/index.js';
import type { Study } from './study.js';

/** Where the coordinates of a mark come from and how good they are said to be; one entry for each time they changed. */
export interface ControlMark {
  readonly mark: string;
  /** First and last day on which they hold; null where they are open. */
  readonly from: string | null;
  readonly to: string | null;
  readonly source: string | null;
  readonly frame: string | null;
  /** Decimal year to which they belong. */
  readonly epoch: number | null;
  /** One standard deviation, mm; horizontal is per axis. */
  readonly horizontalSigmaMm: number | null;
  readonly verticalSigmaMm: number | null;
  readonly sky: 'open' | 'partly' | 'obstructed' | null;
  /** The job was fitted to it: its errors are residuals, not checks. */
  readonly siteMark: boolean;
  /** Grid over ground at the mark, of the first projected system of the study; null without one. */
  readonly combinedFactor: number | null;
}

/** The control behind the errors, in the order of the marks file: marks and times without an error are left out. */
export function controlMarks(
  study: Study,
  { marks }: Control,
  errors: readonly OccupationError[],
): ControlMark[] {
  const used = new Map<string, Set<PointCoordinates>>();
  for (const { mark, day } of errors) {
    const versions = used.get(mark) ?? new Set();
    used.set(mark, versions.add(coordinatesOn(marks.get(mark)!, day)!));
  }
  const projection = firstProjection(study);
  const siteMarks = new Set(study.siteMarks);
  return [...marks.values()].flatMap((mark) =>
    mark.versions
      .filter((version) => used.get(mark.name)?.has(version))
      .map((version) => entry(mark, version, siteMarks.has(mark.name), projection)),
  );
}

function entry(
  { name, sky }: Mark,
  { from, to, source, frame, epoch, horizontalSigmaMm, verticalSigmaMm, position }: PointCoordinates,
  siteMark: boolean,
  projection: Projection | null,
): ControlMark {
  const known = !Number.isNaN(position.latitudeDeg + position.heightM);
  return {
    mark: name,
    from: from || null,
    to: to || null,
    source: source || null,
    frame: frame || null,
    epoch: orNull(epoch),
    horizontalSigmaMm: orNull(horizontalSigmaMm),
    verticalSigmaMm: orNull(verticalSigmaMm),
    sky: sky || null,
    siteMark,
    combinedFactor:
      projection === null || !known ? null : combinedFactor(projection, position).combinedFactor,
  };
}

const orNull = (value: number): number | null => (Number.isNaN(value) ? null : value);

/** That of the marks, else of the first log that has one. */
function firstProjection({ marks, logs }: Study): Projection | null {
  const systems: CoordinateSystem[] = [
    marks.coordinates,
    ...logs.flatMap(({ layout, coordinates }) =>
      layout.kind === 'nmea' ? [] : [layout.coordinates ?? coordinates],
    ),
  ];
  for (const system of new Set(systems)) {
    const known = systemOf(system);
    if (known.kind === 'projected') return known.projection;
  }
  return null;
}
