import type { MarkMean } from '../../split/index.js';
import type { MarkShift } from './markShifts.js';
import type { WatchBasis } from './watchBasis.js';

/** A mark to be visited next, and why. */
export interface NextMark {
  readonly mark: string;
  readonly baselineKm: number;
  /** Days there so far: those fitted, from the base of most of them, and all new ones. */
  readonly days: number;
  readonly reason: 'may have moved' | 'tells most of the ppm' | 'not visited' | 'few days';
  /** One more occupation there adds so much of what all marks tell of the ppm now; null without a model. */
  readonly informationGain: number | null;
}

/**
 * The marks whose visit tells most: one that may have moved, the one that adds most to the information on the ppm, one
 * that was not visited; then those with the fewest days.
 * @param known means of the days fitted, by mark and base
 * @param visited new days at each mark
 */
export function nextMarks(
  known: readonly MarkMean[],
  visited: ReadonlyMap<string, number>,
  shifts: readonly MarkShift[],
  basis: WatchBasis | null,
  count = 3,
): NextMark[] {
  const marks = onePerMark(known);
  const gain = informationGains(marks, basis);
  const days = ({ mark, days: fitted }: MarkMean): number => fitted + (visited.get(mark) ?? 0);
  const byName = (a: MarkMean, b: MarkMean): number => (a.mark < b.mark ? -1 : 1);
  const fewest = [...marks].sort((a, b) => days(a) - days(b) || byName(a, b));
  const moved = [...shifts]
    .filter(({ verdict }) => verdict === 'moved')
    .sort((a, b) => a.pValue! - b.pValue!)
    .flatMap(({ mark }) => marks.filter((one) => one.mark === mark));
  const telling = [...marks]
    .filter(({ mark }) => gain.has(mark))
    .sort((a, b) => gain.get(b.mark)! - gain.get(a.mark)! || byName(a, b));
  const missed = fewest.filter(({ mark }) => !visited.has(mark));
  const wanted: (readonly [MarkMean | undefined, NextMark['reason']])[] = [
    ...moved.map((mark) => [mark, 'may have moved'] as const),
    [telling[0], 'tells most of the ppm'],
    ...missed.map((mark) => [mark, 'not visited'] as const),
    ...fewest.map((mark) => [mark, 'few days'] as const),
  ];
  const next: NextMark[] = [];
  for (const [found, reason] of wanted) {
    if (next.length === count) break;
    if (found === undefined || next.some(({ mark }) => mark === found.mark)) continue;
    const { mark, baselineKm } = found;
    next.push({ mark, baselineKm, days: days(found), reason, informationGain: gain.get(mark) ?? null });
  }
  return next;
}

/** A mark of several bases counts from the one with the most days. */
function onePerMark(known: readonly MarkMean[]): MarkMean[] {
  const marks = new Map<string, MarkMean>();
  for (const one of known) {
    const other = marks.get(one.mark);
    if (other === undefined || one.days > other.days) marks.set(one.mark, one);
  }
  return [...marks.values()];
}

/** Information on the ppm of one more occupation, B² (l - l̄)²/μ², over that of all fitted ones. */
function informationGains(marks: readonly MarkMean[], basis: WatchBasis | null): Map<string, number> {
  if (basis === null) return new Map();
  const { A, B } = basis;
  const weights = marks.map(({ baselineKm, occupations }) => occupations / (A + B * baselineKm ** 2) ** 2);
  const total = weights.reduce((sum, weight) => sum + weight, 0);
  const mean = marks.reduce((sum, { baselineKm }, k) => sum + weights[k]! * baselineKm ** 2, 0) / total;
  const each = marks.map(({ baselineKm }) => ((baselineKm ** 2 - mean) / (A + B * baselineKm ** 2)) ** 2);
  const all = each.reduce((sum, value, k) => sum + marks[k]!.occupations * value, 0);
  return all > 0 ? new Map(marks.map(({ mark }, k) => [mark, each[k]! / all])) : new Map();
}
