import {
  type Ellipsoid,
  type FrameTransformation,
  frameTransformation,
  type Geodetic,
  type GeoidGrid,
  geocentricToGeodetic,
  geodeticToGeocentric,
  groundGrid,
  type SitePosition,
  sitePlane,
  WGS84,
} from '../geodesy/index.js';
import { type CoordinateChanges, CoordinateFault } from '../logs/index.js';
import type {
  GroundGridSettings,
  HeightSettings,
  SitePlaneSettings,
  TransformationSettings,
} from './coordinateSettings.js';

export type HeightKind = HeightSettings['kind'];

/** What one source of coordinates says of itself. */
export interface SourceSettings {
  readonly heights?: HeightSettings | undefined;
  readonly transformation?: TransformationSettings | undefined;
  readonly groundGrid?: GroundGridSettings | undefined;
  readonly sitePlane?: SitePlaneSettings | undefined;
}

export interface ChangeContext {
  /** Kind of heights that the study compares: that of the marks. */
  readonly studyKind: HeightKind;
  /** Separations to fall back on where the source states none of its own: those of the study, then those of the marks. */
  readonly fallbacks: readonly (HeightSettings | undefined)[];
  /** Grid files by the name the study file gives. */
  readonly grids: ReadonlyMap<string, GeoidGrid>;
}

/**
 * What must be done to the coordinates of a source, in this order: undo the job's own plane, undo the ground grid, bring
 * the height to the kind that the study compares, change the frame.
 * @param own kind and separations of the source's heights
 * @throws RangeError when parameters cannot be, and MissingSeparation when nothing leads from one kind of height to the other
 */
export function coordinateChanges(
  own: HeightSettings,
  { transformation, groundGrid: ground, sitePlane: site }: SourceSettings,
  context: ChangeContext,
): CoordinateChanges {
  return {
    ...(ground === undefined && site === undefined ? {} : { plane: undonePlane(ground, site) }),
    ...heightChange(own, context),
    ...(transformation === undefined ? {} : { frame: frameChange(transformation, context.studyKind) }),
  };
}

/** Heights of one kind are to be compared with those of the other, and no separation is stated. */
export class MissingSeparation extends Error {}

function undonePlane(
  ground: GroundGridSettings | undefined,
  site: SitePlaneSettings | undefined,
): (position: SitePosition) => SitePosition {
  const { marks: _, ...parameters } = site ?? {};
  const job = site === undefined ? null : sitePlane(defined(parameters));
  const grid = ground === undefined ? null : groundGrid(defined(ground));
  return (position) => {
    const onGround = job === null ? position : job.undo(position);
    return grid === null ? onGround : { ...onGround, ...grid.inverse(onGround) };
  };
}

function heightChange(
  own: HeightSettings,
  { studyKind, fallbacks, grids }: ChangeContext,
): Pick<CoordinateChanges, 'height' | 'rowSeparations'> {
  if (own.kind === studyKind) return {};
  const separations = statedSeparations(own, fallbacks);
  // Orthometric height = ellipsoidal height − separation.
  const sign = studyKind === 'orthometric' ? -1 : 1;
  switch (separations?.geoid) {
    case 'constant': {
      const constant = sign * separations.separationM!;
      return { height: ({ heightM }) => heightM + constant };
    }
    case 'grid': {
      const grid = grids.get(separations.file!)!;
      return { height: (place) => place.heightM + sign * separationOf(grid, place) };
    }
    case 'column':
      return {
        rowSeparations: true,
        height: ({ heightM }, separationM) => {
          if (!Number.isNaN(separationM)) return heightM + sign * separationM;
          throw new CoordinateFault(
            `expected a geoid separation in the row, since its height is ${own.kind} and those of the marks are ${studyKind}, came none`,
            2,
          );
        },
      };
    default:
      throw new MissingSeparation();
  }
}

/** The separations that count for a source: its own, else the first that the others state. */
const statedSeparations = (
  own: HeightSettings,
  fallbacks: ChangeContext['fallbacks'],
): HeightSettings | undefined => [own, ...fallbacks].find((each) => each?.geoid !== undefined);

/** Whether one separation leads from the source's heights to those that the study compares. */
export const isLevelledByConstant = (own: HeightSettings, { studyKind, fallbacks }: ChangeContext): boolean =>
  own.kind !== studyKind && statedSeparations(own, fallbacks)?.geoid === 'constant';

/** The separation of a place as settings state it; null where they leave it to the rows. */
export function separationAt(
  { geoid, separationM, file }: HeightSettings,
  { grids }: ChangeContext,
): ((place: Geodetic) => number) | null {
  if (geoid === 'constant') return () => separationM!;
  if (geoid !== 'grid') return null;
  const grid = grids.get(file!)!;
  return (place) => separationOf(grid, place);
}

function separationOf(grid: GeoidGrid, place: Geodetic): number {
  try {
    return grid.separationM(place);
  } catch (error) {
    throw new CoordinateFault((error as Error).message, 2);
  }
}

/** Where no height is known to be ellipsoidal, a frame does not move it. */
function frameChange(
  { epoch, backwards = false, ...parameters }: TransformationSettings,
  studyKind: HeightKind,
): (place: Geodetic, ellipsoid: Ellipsoid) => Geodetic {
  const change = frameOf(parameters);
  const turn = backwards ? change.inverse : change.forward;
  return (place, ellipsoid) => {
    const moved = geocentricToGeodetic(
      turn.call(change, geodeticToGeocentric(place, ellipsoid), epoch),
      alike(ellipsoid) ? ellipsoid : WGS84,
    );
    return studyKind === 'orthometric' ? { ...moved, heightM: place.heightM } : moved;
  };
}

/**
 * Ellipsoids of the satellite age, of which frames are compared as if they had the same one: GRS 80 and WGS 84 are 0.1 mm
 * apart.
 */
const alike = ({ semiMajorAxisM, inverseFlattening }: Ellipsoid): boolean =>
  semiMajorAxisM === WGS84.semiMajorAxisM && Math.abs(inverseFlattening - WGS84.inverseFlattening) < 1e-5;

/** The transformation that settings describe. @throws RangeError when they cannot be one */
export function frameOf(settings: Omit<TransformationSettings, 'epoch' | 'backwards'>): FrameTransformation {
  const { rates, ...parameters } = settings;
  return frameTransformation({ ...defined(parameters), ...(rates && { rates: defined(rates) }) });
}

/** Without the keys that are not given. */
function defined<Settings extends object>(
  settings: Settings,
): { [K in keyof Settings]: Exclude<Settings[K], undefined> } {
  return Object.fromEntries(Object.entries(settings).filter(([, value]) => value !== undefined)) as {
    [K in keyof Settings]: Exclude<Settings[K], undefined>;
  };
}
