import { performance } from 'node:perf_hooks';

/** Median seconds of several runs, after one that is not counted. */
export async function medianSeconds(runs: number, work: () => unknown): Promise<number> {
  const times: number[] = [];
  for (let k = 0; k <= runs; k++) {
    const start = performance.now();
    await work();
    if (k > 0) times.push((performance.now() - start) / 1000);
  }
  return times.sort((a, b) => a - b)[Math.floor(times.length / 2)]!;
}
