import { type Message, message } from '../logs/index.js';
import type { OccupationError } from './computeErrors.js';

/** Long static occupations that were cut into shots of one length. */
export interface StaticShots {
  /** Occupations that were cut. */
  readonly occupations: number;
  /** Shots that were cut out of them. */
  readonly shots: number;
  readonly windowSeconds: number;
  /** About so many independent shots tell the same; null when the shots are too few to say. */
  readonly independent: number | null;
}

/** Runs shorter than this say nothing of how alike neighbours are. */
const FEWEST_SHOTS = 8;
const LARGEST_LAG = 40;

/**
 * How much the shots of static occupations tell: neighbouring shots share satellites and air, so that an hour of them
 * may tell no more than a few visits. The number of independent shots is n / (1 + 2 Σ ρ_k) with the autocorrelation of
 * the errors summed over Geyer's initial positive sequence (Geyer 1992, from memory); the more dependent of the
 * horizontal and the vertical component counts.
 * @param errors in the order of time within each mark, rover and setup
 */
export function staticShots(errors: readonly OccupationError[], windowSeconds: number): StaticShots {
  const runs = consecutiveRuns(errors, windowSeconds).filter((run) => run.length > 1);
  const shots = runs.reduce((total, run) => total + run.length, 0);
  const long = runs.filter((run) => run.length >= FEWEST_SHOTS);
  if (long.length === 0) return { occupations: runs.length, shots, windowSeconds, independent: null };
  const horizontal = efficiency(long, ['east', 'north']);
  const vertical = efficiency(long, ['up']);
  const independent = Math.max(runs.length, Math.round(shots * Math.min(horizontal, vertical)));
  return { occupations: runs.length, shots, windowSeconds, independent };
}

export function staticMessage({ occupations, shots, windowSeconds, independent }: StaticShots): Message[] {
  if (occupations === 0) return [];
  const told =
    independent === null
      ? 'too few to say how many of them are independent'
      : `which tell about as much as ${independent} independent ones`;
  return [
    message(
      'info',
      'static-shots',
      `${occupations} static ${occupations === 1 ? 'occupation was' : 'occupations were'} cut into ${shots} shots of ${windowSeconds} s, ${told}: neighbours share satellites and air. Days count, not shots.`,
    ),
  ];
}

/** Shots that follow each other without a pause on one mark by one rover. */
function consecutiveRuns(errors: readonly OccupationError[], windowSeconds: number): OccupationError[][] {
  const open = new Map<string, OccupationError[]>();
  const runs: OccupationError[][] = [];
  const sorted = errors.filter(({ startMs }) => !Number.isNaN(startMs)).sort((a, b) => a.startMs - b.startMs);
  for (const error of sorted) {
    const key = `${error.rover}\u0000${error.mark}\u0000${error.setup}`;
    const run = open.get(key);
    const last = run?.at(-1);
    // The next window of the same stay begins one window after this one, or a little later where epochs are missing.
    if (run !== undefined && error.startMs - last!.startMs < 2000 * windowSeconds) run.push(error);
    else {
      const next = [error];
      open.set(key, next);
      runs.push(next);
    }
  }
  return runs;
}

/** Independent shots per shot: 1 / (1 + 2 Σ ρ_k), with ρ_k pooled over runs and components. */
function efficiency(
  runs: readonly OccupationError[][],
  components: readonly ('east' | 'north' | 'up')[],
): number {
  const series = runs.flatMap((run) =>
    components
      .map((component) => run.map((error) => error[component]))
      .filter((values) => !values.some(Number.isNaN)),
  );
  // Errors are counted from the mark, not from the mean of the run: what a run has in common is dependence too.
  const products = (lag: number): number =>
    series.reduce(
      (total, values) => total + values.slice(lag).reduce((sum, value, k) => sum + value * values[k]!, 0),
      0,
    );
  const variance = products(0);
  if (!(variance > 0)) return 1;
  const longest = Math.min(LARGEST_LAG, Math.max(...series.map(({ length }) => length)) - 1);
  let sum = 0;
  for (let lag = 1; lag < longest; lag += 2) {
    const pair = (products(lag) + products(lag + 1)) / variance;
    if (pair <= 0) break;
    sum += pair;
  }
  return 1 / (1 + 2 * sum);
}
