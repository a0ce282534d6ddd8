import { inputError } from '../../logs/index.js';
import { type FitData, pickEntries } from '../prepareErrors.js';
import { markCells } from './markCells.js';
import { SHARE_ON_REPEATED_MARKS, severalBases, shareOnRepeatedMarks } from './repeatedMarks.js';
import {
  describeSetups,
  FEWEST_VISITS,
  LEAST_SPREAD_DEG,
  pickInput,
  type RelativeInput,
  usable,
} from './separableSetups.js';
import { separateSetups } from './separateSetups.js';
import { visitsOf } from './visits.js';

/** One setup and the offset common to its errors. */
export interface SetupOffset {
  readonly setup: string;
  readonly occupations: number;
  readonly visits: number;
  readonly azimuthSpreadDeg: number;
  readonly separable: boolean;
  /** Why no offset can be told from the errors of the marks; null where one is. */
  readonly reason: string | null;
  /** By axis (east and north, or up), mm; null where not separable. */
  readonly offsetMm: readonly number[] | null;
  /** Of each axis, mm. */
  readonly standardErrorMm: number | null;
}

/** Errors counted from each setup's common offset. */
export interface SetupSeparation {
  readonly data: FitData;
  readonly setups: readonly SetupOffset[];
  /** Correlation of occupations of one visit. */
  readonly rho: number;
  /** Spread of the setups' offsets per axis beyond their uncertainty, mm. */
  readonly sigmaBaseMm: number;
  /** Σ (offset/SE)² and how many offsets went into it. */
  readonly chiSquare: number;
  readonly degreesOfFreedom: number;
  /** Whether the marks' own means were taken out too. */
  readonly marksTakenOut: boolean;
  /** Occupations in setups that cannot be separated. */
  readonly setAside: number;
  /** Occupations on marks with a single counting day, where marks were taken out. */
  readonly onLoneMarks: number;
  readonly converged: boolean;
}

/**
 * Takes each setup's common offset out of the errors. Setups with fewer than 3 visits, or with marks within less than
 * 90° of direction (an offset then looks like an error growing with distance), are set aside. Where at least half of the
 * occupations lie on marks with 3 days or more, the marks' own means are taken out too.
 * @throws InputError when no setup can be separated
 */
export function relative(data: FitData, input: RelativeInput): SetupSeparation {
  const all = Array.from(data.y.keys());
  const repeating = shareOnRepeatedMarks(data, input) >= SHARE_ON_REPEATED_MARKS;
  const everySetup = describeSetups(data, input, all);
  const { kept, onLoneMarks } = usable(data, input, all, repeating);
  if (kept.length === 0) {
    throw inputError(
      'no-setup-separable',
      `Expected setups with at least ${FEWEST_VISITS} visits on marks in directions ${LEAST_SPREAD_DEG}° or more apart for reference "relative", came none of ${everySetup.length}: an error of the base cannot be told from errors of the marks. Visit marks on several sides of the base in each setup, or choose reference "absolute".`,
    );
  }
  const part = pickEntries(data, kept);
  const chosen = pickInput(input, kept);
  const cells = repeating
    ? markCells({ ...part, mark: chosen.mark, base: severalBases(chosen), azimuthDeg: null })
    : null;
  const visits = visitsOf(chosen);
  const separated = separateSetups(part, chosen.setup, visits, cells);
  const described = new Map(
    describeSetups(part, chosen, Array.from(kept.keys())).map((one) => [one.setup, one]),
  );
  const index = new Map(separated.setups.map((name, s) => [name, s]));
  const setups = everySetup.map((one): SetupOffset => {
    const s = index.get(one.setup);
    if (s === undefined) {
      const reason = one.reason ?? 'its marks were visited on a single day and have no means of their own';
      return { ...one, separable: false, reason, offsetMm: null, standardErrorMm: null };
    }
    return {
      ...described.get(one.setup)!,
      separable: true,
      reason: null,
      offsetMm: separated.offsetMm.map((column) => column[s]!),
      standardErrorMm: separated.standardErrorMm[s]!,
    };
  });
  const { sharing } = sharingOf(cells);
  return {
    data: {
      ...part,
      y: separated.y,
      components: separated.components,
      ...(sharing === undefined ? {} : { sharing }),
    },
    setups,
    rho: separated.rho,
    ...baseSpread(setups),
    marksTakenOut: repeating,
    setAside: data.y.length - kept.length - onLoneMarks,
    onLoneMarks,
    converged: separated.converged,
  };
}

function sharingOf(cells: ReturnType<typeof markCells> | null): { readonly sharing?: Float64Array } {
  if (cells === null) return {};
  const days = Float64Array.from(cells.cellOf, (k) => cells.countingDays[cells.markOf[k]!]!);
  return { sharing: days.map((count) => count / (count - 1)) };
}

/** σ_base² = mean of offset² - SE², cut at 0, over setups and axes; χ² of no offset anywhere. */
function baseSpread(setups: readonly SetupOffset[]) {
  const parts = setups.flatMap(({ offsetMm, standardErrorMm }) =>
    (offsetMm ?? []).map((offset) => ({ square: offset ** 2, variance: standardErrorMm! ** 2 })),
  );
  const excess = parts.reduce((sum, { square, variance }) => sum + square - variance, 0) / parts.length;
  return {
    sigmaBaseMm: Math.sqrt(Math.max(0, excess)),
    chiSquare: parts.reduce((sum, { square, variance }) => sum + square / variance, 0),
    degreesOfFreedom: parts.length,
  };
}
