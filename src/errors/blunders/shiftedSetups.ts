import { median } from '../../stats/index.js';
import type { OccupationError } from '../computeErrors.js';
import { groupIndices } from '../groupIndices.js';
import type { Residuals } from './residuals.js';

/** A setup is shifted from these sizes on … */
const PLAN_MM = 40;
const UP_MM = 60;
/** … that are so many times what its occupations scatter together by chance. */
const TIMES_CHANCE = 6;
/** A shift is one only when what is left of the setup is as usual. */
const LEFT_TIMES = 2;
const FEWEST_OCCUPATIONS = 4;
const FEWEST_MARKS = 2;
/** A study in which more setups are shifted has a common cause, not blunders. */
const LARGEST_SHARE = 0.3;

export interface ShiftedSetup {
  readonly indices: readonly number[];
  readonly words: string;
}

/** Setups whose occupations are all off by the same vector: at several marks, near and far. */
export function shiftedSetups(errors: readonly OccupationError[], residuals: Residuals): ShiftedSetup[] {
  const setups = groupIndices(errors.map(({ setup, base }) => `${base}\u0000${setup}`));
  const found = [...setups.values()].flatMap((indices) => {
    const marks = new Set(indices.map((i) => errors[i]!.mark)).size;
    if (indices.length < FEWEST_OCCUPATIONS || marks < FEWEST_MARKS) return [];
    const words = shiftOf(indices, residuals);
    return words === null ? [] : [{ indices, words }];
  });
  return found.length > LARGEST_SHARE * setups.size ? [] : found;
}

function shiftOf(indices: readonly number[], residuals: Residuals): string | null {
  const { east, north, up, planScale, upScale } = residuals;
  const plan = [east, north].map((values) => shifted(indices, values, planScale, PLAN_MM / Math.SQRT2));
  const height = shifted(indices, up, upScale, UP_MM);
  const names = ['east', 'north', 'up'] as const;
  const told = [...plan, height].flatMap((shift, k) =>
    shift === null ? [] : [`${shift < 0 ? '−' : '+'}${Math.abs(shift).toFixed(0)} mm ${names[k]}`],
  );
  return told.length === 0 ? null : told.join(', ');
}

/** The common shift of one component; null when there is none beyond chance. */
function shifted(
  indices: readonly number[],
  values: Float64Array,
  scale: Float64Array,
  leastMm: number,
): number | null {
  const known = indices.filter((i) => !Number.isNaN(values[i]!));
  if (known.length < FEWEST_OCCUPATIONS) return null;
  const shift = median(known.map((i) => values[i]!));
  const usual = median(known.map((i) => scale[i]!));
  const chance = (1.25 * usual) / Math.sqrt(known.length);
  const left = 1.4826 * median(known.map((i) => Math.abs(values[i]! - shift)));
  const told = Math.abs(shift) > Math.max(leastMm, TIMES_CHANCE * chance) && left < LEFT_TIMES * usual;
  return told ? shift : null;
}
