import type { ErrorColumns } from '../../errors/index.js';
import { goodDayShareLimit } from '../dayBound.js';
import type { NewErrors } from '../frozenMarks.js';
import { percent } from '../reasons.js';
import type { Tolerance } from '../tolerance.js';

/** A shot within the length of a rule that missed its limit. */
export interface FailedShot {
  readonly day: string;
  readonly mark: string;
  readonly base: string;
  readonly crew: string;
  readonly rover: string;
  readonly baselineKm: number;
  readonly errorMm: number;
  /** It is a suspected wrong fix. */
  readonly suspected: boolean;
}

/** A rule counted out on days it was made without. */
export interface RuleCount {
  readonly limitMm: number;
  readonly share: number;
  readonly dayShare: number;
  readonly confidence: number;
  /** Shortest and longest of the maximum baselines with which days were judged; null without a rule. */
  readonly lengthKm: { readonly from: number; readonly to: number } | null;
  readonly shots: number;
  readonly held: number;
  readonly days: number;
  /** Days on which at least the share held. */
  readonly goodDays: number;
  /** Lower limit of the share of such days, at the tolerance's confidence and without any model. */
  readonly goodDayShareLow: number | null;
  readonly failures: readonly FailedShot[];
  readonly sentence: string;
}

/** Adds up the shots of judged days. */
export class RuleCounter {
  private shots = 0;
  private held = 0;
  private days = 0;
  private goodDays = 0;
  private lengths: number[] = [];
  private readonly failures: FailedShot[] = [];

  constructor(
    private readonly tolerance: Tolerance,
    private readonly columns: ErrorColumns,
    private readonly weights: Float64Array | null,
  ) {}

  /** @param maximumKm the rule made without the day */
  addDay(day: string, { rows, y, l }: NewErrors, maximumKm: number): void {
    this.lengths.push(maximumKm);
    let [inside, held] = [0, 0];
    rows.forEach((row, k) => {
      const baselineKm = Math.sqrt(l[k]!);
      if (baselineKm > maximumKm + 1e-9) return;
      inside += 1;
      const errorMm = Math.sqrt(y[k]!);
      if (errorMm <= this.tolerance.limitMm) held += 1;
      else this.failures.push(this.failure(day, row, baselineKm, errorMm));
    });
    if (inside === 0) return;
    this.days += 1;
    this.shots += inside;
    this.held += held;
    if (held >= this.tolerance.share * inside - 1e-9) this.goodDays += 1;
  }

  count(whose = 'the rule'): RuleCount {
    const { limitMm, share, dayShare, confidence } = this.tolerance;
    const { shots, held, days, goodDays, failures } = this;
    const lengthKm =
      this.lengths.length === 0 ? null : { from: Math.min(...this.lengths), to: Math.max(...this.lengths) };
    const common = { limitMm, share, dayShare, confidence, lengthKm, shots, held, days, goodDays };
    if (lengthKm === null || shots === 0) {
      return {
        ...common,
        goodDayShareLow: null,
        failures,
        sentence: `No shot lies inside the length of ${whose}, so that nothing can be counted.`,
      };
    }
    const missed = shots - held;
    const others =
      missed === 0
        ? 'none missed it'
        : `the ${missed === 1 ? 'other one is' : `${missed} others are`} listed`;
    const low = goodDayShareLimit(goodDays, days, confidence);
    return {
      ...common,
      goodDayShareLow: low,
      failures,
      sentence: `Of ${shots} shots inside ${lengthText(lengthKm)} ${held} held ${limitMm} mm; ${others}. On ${goodDays} of ${days} days at least ${percent(share)} held it: that shows at least ${percent(Math.floor(1000 * low) / 1000)} of such days (${percent(confidence)} confidence, no model).`,
    };
  }

  private failure(day: string, row: number, baselineKm: number, errorMm: number): FailedShot {
    const text = (name: string): string =>
      this.columns.has(name) ? this.columns.texts(name, 'the list of shots')[row]! : '';
    return {
      day,
      mark: text('mark'),
      base: text('base'),
      crew: text('crew'),
      rover: text('rover'),
      baselineKm,
      errorMm,
      suspected: this.weights !== null && this.weights[row]! < 0.5,
    };
  }
}

function lengthText({ from, to }: { readonly from: number; readonly to: number }): string {
  const [near, far] = [from, to].map((km) => (Math.floor(km * 10 + 1e-9) / 10).toFixed(1));
  return near === far ? `${near} km` : `${near} to ${far} km`;
}
