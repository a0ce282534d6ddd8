import { clusteredMean } from '../../split/index.js';
import { studentTQuantile } from '../../stats/index.js';

/** Shots with the limit that was set for each before it was seen. */
export interface JudgedShots {
  readonly days: readonly string[];
  readonly baselineKm: Float64Array;
  /** Size of the error and of the limit, mm. */
  readonly errorMm: Float64Array;
  readonly limitMm: Float64Array;
  /** 1, or less for suspected wrong fixes. */
  readonly weights: Float64Array;
  /** Log density of each error. */
  readonly logDensity: Float64Array | null;
}

/** A share of shots with an interval that counts days. */
export interface ObservedShare {
  readonly observedShare: number;
  /** Null with fewer than two days. */
  readonly low: number | null;
  readonly high: number | null;
}

export interface LengthClassShare extends ObservedShare {
  readonly fromKm: number;
  /** Null: and beyond. */
  readonly toKm: number | null;
  readonly occupations: number;
  readonly days: number;
}

/** How well limits held on shots that they had not seen. */
export interface BackTestScore extends ObservedShare {
  readonly occupations: number;
  /** The same share with suspected wrong fixes counted in full. */
  readonly shareWithSuspects: number;
  readonly days: number;
  /** Days on which at least the share lay inside. */
  readonly goodDays: number;
  readonly goodDayShare: number;
  /** Mean log density per shot; greater is better. Null where the limits are no density. */
  readonly logScore: number | null;
  /** Mean pinball loss of the limits, mm; smaller is better (Koenker & Bassett 1978; from memory). */
  readonly pinballMm: number;
  readonly lengthClasses: readonly LengthClassShare[];
}

const EDGES_KM = [0, 5, 10, 20, Number.POSITIVE_INFINITY];

/** @param share that the limits are to hold */
export function scoreShots(shots: JudgedShots, share: number, confidence: number): BackTestScore | null {
  const { days, errorMm, limitMm, weights, logDensity } = shots;
  const n = days.length;
  const total = weights.reduce((sum, w) => sum + w, 0);
  if (n === 0 || !(total > 0)) return null;
  const inside = errorMm.map((error, i) => (error <= limitMm[i]! ? 1 : 0));
  const perDay = new Map<string, { inside: number; all: number }>();
  let [pinball, density, held] = [0, 0, 0];
  for (let i = 0; i < n; i++) {
    const w = weights[i]!;
    const over = errorMm[i]! - limitMm[i]!;
    pinball += w * (over > 0 ? share * over : (share - 1) * over);
    density += w * (logDensity?.[i] ?? 0);
    held += inside[i]!;
    const day = perDay.get(days[i]!) ?? { inside: 0, all: 0 };
    day.inside += w * inside[i]!;
    day.all += w;
    perDay.set(days[i]!, day);
  }
  const judgedDays = [...perDay.values()].filter(({ all }) => all > 0);
  const goodDays = judgedDays.filter((day) => day.inside >= share * day.all - 1e-9).length;
  return {
    ...observedShare(inside, shots, Array.from(days.keys()), confidence),
    occupations: n,
    shareWithSuspects: held / n,
    days: judgedDays.length,
    goodDays,
    goodDayShare: goodDays / judgedDays.length,
    logScore: logDensity === null ? null : density / total,
    pinballMm: pinball / total,
    lengthClasses: lengthClasses(inside, shots, confidence),
  };
}

/**
 * Weighted share of some rows with the day-clustered interval, Student t, cut to [0, 1]. Where all or none lie inside, the
 * exact limit of as many days takes its place (Clopper & Pearson 1934; from memory).
 */
function observedShare(
  inside: Float64Array,
  { days, weights }: JudgedShots,
  rows: readonly number[],
  confidence: number,
): ObservedShare {
  const {
    mean,
    standardError,
    days: groups,
  } = clusteredMean(
    rows.map((i) => inside[i]!),
    rows.map((i) => days[i]!),
    rows.map((i) => weights[i]!),
  );
  if (groups < 2) return { observedShare: mean, low: null, high: null };
  const exact = ((1 - confidence) / 2) ** (1 / groups);
  if (mean > 1 - 1e-12) return { observedShare: 1, low: exact, high: 1 };
  if (mean < 1e-12) return { observedShare: 0, low: 0, high: 1 - exact };
  const half = studentTQuantile((1 + confidence) / 2, groups - 1) * standardError;
  return { observedShare: mean, low: Math.max(0, mean - half), high: Math.min(1, mean + half) };
}

function lengthClasses(inside: Float64Array, shots: JudgedShots, confidence: number): LengthClassShare[] {
  return EDGES_KM.slice(1).flatMap((toKm, k): LengthClassShare[] => {
    const fromKm = EDGES_KM[k]!;
    const rows = Array.from(shots.days.keys()).filter((i) => {
      const km = shots.baselineKm[i]!;
      return km >= fromKm && km < toKm && shots.weights[i]! > 0;
    });
    if (rows.length === 0) return [];
    return [
      {
        fromKm,
        toKm: Number.isFinite(toKm) ? toKm : null,
        occupations: rows.length,
        days: new Set(rows.map((i) => shots.days[i]!)).size,
        ...observedShare(inside, shots, rows, confidence),
      },
    ];
  });
}
