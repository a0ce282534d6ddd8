import { describe, expect, it } from 'vitest';
import { type OccupationError, staticMessage, staticShots } from '../../src/errors/index.js';
import { normalDeviates, randomStream } from '../../src/stats/index.js';

const WINDOW = 10;

/** Static runs of first-order autoregressive errors; `alike` is the correlation of neighbours. */
function runs(count: number, length: number, alike: number, seed = 1): OccupationError[] {
  const normal = normalDeviates(randomStream(seed, 'static'));
  return Array.from({ length: count }, (_, run) => {
    let [east, north, up] = [normal(), normal(), normal()];
    const next = (value: number): number => alike * value + Math.sqrt(1 - alike ** 2) * normal();
    return Array.from({ length }, (_unused, k) => {
      if (k > 0) [east, north, up] = [next(east), next(north), next(up)];
      const startMs = (run * 1e5 + k * WINDOW) * 1000;
      return { rover: 'R', mark: 'M', setup: 'S', startMs, east, north, up } as OccupationError;
    });
  }).flat();
}

describe('static shots', () => {
  it('count in full when they are independent', () => {
    const found = staticShots(runs(20, 60, 0), WINDOW);
    expect(found).toMatchObject({ occupations: 20, shots: 1200, windowSeconds: WINDOW });
    expect(found.independent!).toBeGreaterThan(1000);
  });
  it('count as (1 - ρ)/(1 + ρ) of their number when neighbours are alike (textbook, first-order autoregression)', () => {
    const alike = 0.8;
    const found = staticShots(runs(60, 200, alike), WINDOW);
    const expected = (12_000 * (1 - alike)) / (1 + alike);
    expect(found.independent! / expected).toBeGreaterThan(0.75);
    expect(found.independent! / expected).toBeLessThan(1.25);
  });
  it('say nothing of independence when runs are short, and nothing at all when nothing was cut', () => {
    const short = staticShots(runs(5, 4, 0.5), WINDOW);
    expect(short).toMatchObject({ occupations: 5, shots: 20, independent: null });
    expect(staticMessage(short)[0]!.text).toContain('too few to say');
    expect(staticMessage(staticShots(runs(5, 1, 0.5), WINDOW))).toEqual([]);
  });
  it('leave out shots without a time of day', () => {
    const dated = runs(1, 20, 0).map((error) => ({ ...error, startMs: Number.NaN }));
    expect(staticShots(dated, WINDOW)).toMatchObject({ occupations: 0, shots: 0 });
  });
});
