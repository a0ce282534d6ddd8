import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { comboFit, everyCombo } from '../../src/days/comboFit.js';
import { DAY_COMBOS, THETAS } from '../../src/days/index.js';
import { randomStream } from '../../src/stats/index.js';

/** Days that say much or little, alike or in two bunches, some with two peaks of their own. */
function likelihoods(seed: number, days: number): Float64Array {
  const random = randomStream(seed);
  const [bunches, apart] = [random() < 0.5 ? 1 : 2, 2 * random()];
  const rows = Array.from({ length: days }, () => {
    const center = -0.8 + 0.3 * random() + (bunches === 2 && random() < 0.4 ? apart : 0);
    const width = 0.03 + random() ** 3;
    const second = random() < 0.1 ? center + 1 : Number.NaN;
    const row = Array.from(
      THETAS,
      (theta) =>
        Math.exp(-0.5 * ((theta - center) / width) ** 2) +
        (Number.isNaN(second) ? 0 : 0.3 * Math.exp(-0.5 * ((theta - second) / width) ** 2)),
    );
    const best = Math.max(...row);
    return row.map((value) => value / best);
  });
  return Float64Array.from(rows.flat());
}

describe('combos that are not reckoned', () => {
  it('have no weight that counts', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 1e6 }), fc.integer({ min: 2, max: 60 }), (seed, days) => {
        const likelihood = likelihoods(seed, days);
        const { weights, marginals } = comboFit(likelihood);
        const all = everyCombo(likelihood);
        const logs = Float64Array.from(DAY_COMBOS, (_, j) =>
          all.subarray(j * days, (j + 1) * days).reduce((sum, value) => sum + Math.log(value), 0),
        );
        const best = logs.reduce((a, b) => Math.max(a, b));
        const exact = logs.map((log, j) => Math.exp(log - best) * DAY_COMBOS[j]!.width);
        const total = exact.reduce((a, b) => a + b);
        weights.forEach((weight, j) => {
          expect(Math.abs(weight - exact[j]! / total)).toBeLessThan(1e-11);
          if (weight > 1e-12) {
            expect(marginals.subarray(j * days, (j + 1) * days)).toEqual(
              all.subarray(j * days, (j + 1) * days),
            );
          }
        });
      }),
      { seed: 5, numRuns: 30 },
    );
  });
});
