import { type ErrorsInput, errorColumns } from '../errors/index.js';
import { sum } from '../stats/index.js';
import { groupComparison, groupsOf } from './groups.js';
import { LENGTH_EDGES_KM } from './summarizeBy.js';

/** How many occupations of a class of length are flagged, such as suspected wrong fixes. */
export interface FlaggedClass {
  readonly fromKm: number;
  readonly toKm: number;
  /** Root-mean-square baseline of the class. */
  readonly baselineKm: number;
  readonly occupations: number;
  readonly flagged: number;
}

/**
 * Counts flagged occupations by class of baseline length, nearest first; classes without occupations are left out.
 * @param flagged rows of the errors
 * @throws InputError when `baselineKm` is missing
 */
export function flaggedByLength(
  errors: ErrorsInput,
  flagged: readonly number[],
  edges: readonly number[] = LENGTH_EDGES_KM,
): FlaggedClass[] {
  const columns = errorColumns(errors);
  const by = { column: 'baselineKm', edges };
  const lengths = columns.numbers('baselineKm', 'shares by length');
  const groups = groupsOf(columns, by);
  const isFlagged = new Set(flagged);
  return [...new Set(groups)].sort(groupComparison(by)).flatMap((group): FlaggedClass[] => {
    const { from, to } = group;
    if (from === null || to === null) return [];
    const rows = [...groups.keys()].filter((i) => groups[i] === group);
    return [
      {
        fromKm: from,
        toKm: to,
        baselineKm: Math.sqrt(sum(rows.map((i) => lengths[i]! ** 2)) / rows.length),
        occupations: rows.length,
        flagged: rows.filter((i) => isFlagged.has(i)).length,
      },
    ];
  });
}
