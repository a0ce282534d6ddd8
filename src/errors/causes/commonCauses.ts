import { type Control, coordinatesOn } from '../../control/index.js';
import { baselineBetween, type Geodetic, type LengthUnit } from '../../geodesy/index.js';
import type { CoordinateSystem } from '../../logs/index.js';
import type { OccupationError } from '../computeErrors.js';
import type { FarOffPlace } from '../farOffPlaces.js';
import { groupIndices } from '../groupIndices.js';
import { causesInVectors } from './likelyCauses.js';
import { type MarkVector, markVectors } from './markVectors.js';
import { type ComparedPlace, rereadings } from './rereadings.js';
import { type CommonParameter, commonParameters } from './similarity.js';

/** Something that all or many errors have in common, named before anything is fitted. Nothing is repaired. */
export interface LikelyCause {
  readonly code: string;
  /** What was found, with its size and standard error. */
  readonly text: string;
  /** What to look at or to state in the study file. */
  readonly remedy: string;
}

/** What the marks of one base have in common. */
export interface BaseParameters {
  readonly base: string;
  readonly marks: number;
  readonly days: number;
  readonly parameters: readonly CommonParameter[];
}

export interface CommonCauses {
  /** One entry a base, in the order of names. */
  readonly bases: readonly BaseParameters[];
  readonly causes: readonly LikelyCause[];
}

/** How coordinates are read. */
export interface ReadAs {
  readonly system: CoordinateSystem;
  readonly length: LengthUnit;
  readonly height: LengthUnit;
}

export interface CauseInput {
  /** All errors, also those set aside for being far off. */
  readonly errors: readonly OccupationError[];
  readonly control: Control;
  /** Positions too far off to be averaged. */
  readonly farOff: readonly FarOffPlace[];
  /** How the coordinates of logs and marks are read. */
  readonly logs: readonly ReadAs[];
  readonly marks: ReadAs;
}

/**
 * The shift, scale, rotation and tilts that the marks of each base have in common, and what most likely caused them:
 * coordinates read in another unit, zone or order of axes, another frame or realisation, a grid taken for ground, a kind
 * of height, a rod, a base on an assumed coordinate.
 */
export function commonCauses(input: CauseInput): CommonCauses {
  const { errors, control, logs } = input;
  const vectors = markVectors(errors, control);
  const byBase = groupIndices(vectors.map(({ base }) => base));
  const bases = [...byBase.keys()].sort().map((base): BaseParameters => {
    const own = byBase.get(base)!.map((i) => vectors[i]!);
    return {
      base,
      marks: own.length,
      days: new Set(errors.filter((error) => error.base === base).map(({ day }) => day)).size,
      parameters: simplerParameters(own),
    };
  });
  const misread = rereadings(comparedPlaces(vectors, input), input);
  // What was misread has a shift and a scale of its own: these say nothing more.
  const causes = misread.length > 0 ? misread : causesInVectors(bases, vectors, logs);
  return { bases, causes };
}

/** From this common height error on it matters whether it is a shift in space or one along each mark's own vertical. */
const TALL_MM = 300;

/**
 * A shift in space and heights of another kind differ in what they do to the plan: of the two the one is taken that needs
 * less scale.
 */
function simplerParameters(vectors: readonly MarkVector[]): CommonParameter[] {
  const inSpace = commonParameters(vectors);
  const of = (list: readonly CommonParameter[], name: CommonParameter['name']): number =>
    Math.abs(list.find((each) => each.name === name)?.estimate ?? 0);
  if (of(inSpace, 'shift-up') < TALL_MM) return inSpace;
  const alongVerticals = commonParameters(
    vectors.map((vector) => ({ ...vector, east: vector.levelEast, north: vector.levelNorth })),
  );
  return of(alongVerticals, 'scale') < of(inSpace, 'scale') ? alongVerticals : inSpace;
}

/** Where marks are measured and where they should be, with positions that were too far off to be averaged. */
function comparedPlaces(vectors: readonly MarkVector[], { control, farOff }: CauseInput): ComparedPlace[] {
  const far = farOff.flatMap(({ mark, day, place }): ComparedPlace[] => {
    const known = coordinatesOn(control.marks.get(mark)!, day)?.position;
    if (known === undefined || Number.isNaN(known.latitudeDeg)) return [];
    return [{ mark, known, measured: place, base: nearestBase(control, known, place) }];
  });
  const near = vectors.filter(({ east, up }) => !Number.isNaN(east) || !Number.isNaN(up));
  return [
    ...near.map(({ mark, known, measured, base }) => ({
      mark,
      known,
      measured,
      base: control.bases.get(base)!.position,
    })),
    ...far,
  ];
}

/** The base from which a position far from its mark was most likely taken: the one nearest to either. */
function nearestBase(control: Control, known: Geodetic, measured: Geodetic): Geodetic {
  const places = [...control.bases.values()].map(({ position }) => position);
  const reach = (base: Geodetic): number =>
    Math.min(baselineBetween(base, known).lengthKm, baselineBetween(base, measured).lengthKm);
  return places.reduce((best, next) => (reach(next) < reach(best) ? next : best));
}
