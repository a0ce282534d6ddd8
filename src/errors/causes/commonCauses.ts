import type { Control } from '../../control/index.js';
import { coordinatesOn } from '../../control/index.js';
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

export interface CauseInput {
  /** All errors, also those set aside for being far off. */
  readonly errors: readonly OccupationError[];
  readonly control: Control;
  /** Positions too far off to be averaged. */
  readonly farOff: readonly FarOffPlace[];
  /** How logs and marks are written. */
  readonly logSystems: readonly CoordinateSystem[];
  readonly markSystem: CoordinateSystem;
}

/**
 * The shift, scale, rotation and tilts that the marks of each base have in common, and what most likely caused them:
 * coordinates read in another unit, zone or order of axes, another frame or realisation, a grid taken for ground, a kind
 * of height, a rod, a base on an assumed coordinate.
 */
export function commonCauses(input: CauseInput): CommonCauses {
  const { errors, control, logSystems } = input;
  const vectors = markVectors(errors, control);
  const byBase = groupIndices(vectors.map(({ base }) => base));
  const bases = [...byBase.keys()].sort().map((base): BaseParameters => {
    const own = byBase.get(base)!.map((i) => vectors[i]!);
    return {
      base,
      marks: own.length,
      days: new Set(errors.filter((error) => error.base === base).map(({ day }) => day)).size,
      parameters: commonParameters(own),
    };
  });
  const misread = rereadings(comparedPlaces(vectors, input), input);
  // What was misread has a shift and a scale of its own: these say nothing more.
  const causes = misread.length > 0 ? misread : causesInVectors(bases, vectors, logSystems);
  return { bases, causes };
}

/** Where marks are measured and where they should be, with positions that were too far off to be averaged. */
function comparedPlaces(vectors: readonly MarkVector[], { control, farOff }: CauseInput): ComparedPlace[] {
  const far = farOff.flatMap(({ mark, day, place }): ComparedPlace[] => {
    const known = coordinatesOn(control.marks.get(mark)!, day)?.position;
    return known === undefined || Number.isNaN(known.latitudeDeg) ? [] : [{ mark, known, measured: place }];
  });
  const near = vectors.filter(({ east, up }) => !Number.isNaN(east) || !Number.isNaN(up));
  return [...near.map(({ mark, known, measured }) => ({ mark, known, measured })), ...far];
}
