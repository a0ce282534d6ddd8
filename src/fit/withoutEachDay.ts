import type { ErrorsInput } from '../errors/index.js';
import { estimateVariance } from './estimate.js';
import { tooAlike } from './fitErrorModel.js';
import { type FitOptions, resolveFitOptions } from './options.js';
import { type FitData, prepareErrors } from './prepareErrors.js';

/** The fit without one day; null where the other days cannot tell mm and ppm apart. */
export interface FitWithoutDay {
  readonly day: string;
  readonly constantMm: number | null;
  readonly ppm: number | null;
}

/**
 * The point estimate with each day left out in turn (delete-one-day jackknife): shows which days carry the result.
 * @throws InputError as fitErrorModel
 */
export function fitWithoutEachDay(errors: ErrorsInput, options: FitOptions): FitWithoutDay[] {
  const data = prepareErrors(errors, resolveFitOptions(options).component);
  const whole = tooAlike(data.l) ? undefined : estimateVariance(data);
  const cells = lengthCells(data);
  return cells.days.map(({ day, counts, sums }) => {
    const kept = [...cells.lengths.keys()].filter((k) => cells.counts[k]! > counts[k]!);
    const pick = (value: (k: number) => number): Float64Array => Float64Array.from(kept, value);
    const l = pick((k) => cells.lengths[k]!);
    const w = pick((k) => cells.counts[k]! - counts[k]!);
    const y = pick((k) => Math.max(0, cells.sums[k]! - sums[k]!) / (cells.counts[k]! - counts[k]!));
    const none = { day, constantMm: null, ppm: null };
    if (l.length === 0 || tooAlike(l)) return none;
    const { displayA, displayB, converged } = estimateVariance({ y, l, w }, whole);
    return converged ? { day, constantMm: Math.sqrt(displayA), ppm: Math.sqrt(displayB) } : none;
  });
}

/** Counts and sums of squared errors by distinct length, in all and of each day. */
interface LengthCells {
  readonly lengths: Float64Array;
  readonly counts: Float64Array;
  readonly sums: Float64Array;
  readonly days: readonly {
    readonly day: string;
    readonly counts: Float64Array;
    readonly sums: Float64Array;
  }[];
}

/** The estimate depends on the errors of one length through their number and their sum of squares alone. */
function lengthCells({ y, l, day }: FitData): LengthCells {
  const lengths = Float64Array.from(new Set(l)).sort();
  const index = new Map(Array.from(lengths, (length, k) => [length, k]));
  const empty = () => ({ counts: new Float64Array(lengths.length), sums: new Float64Array(lengths.length) });
  const all = empty();
  const days = new Map<string, ReturnType<typeof empty>>();
  y.forEach((value, i) => {
    let own = days.get(day[i]!);
    if (own === undefined) {
      own = empty();
      days.set(day[i]!, own);
    }
    const k = index.get(l[i]!)!;
    for (const cells of [all, own]) {
      cells.counts[k]! += 1;
      cells.sums[k]! += value;
    }
  });
  return { lengths, ...all, days: [...days].map(([name, own]) => ({ day: name, ...own })) };
}
