import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { simulateErrors } from '../../src/campaign/index.js';
import { dayModel } from '../../src/days/index.js';
import { fitErrorModel } from '../../src/fit/index.js';
import { limitOf } from '../../src/rule/checkshot/tails.js';
import { daysNeeded, goodDayShareLimit } from '../../src/rule/index.js';
import { shareWithin } from '../../src/rule/reach/allDays.js';
import { dayLimits, dayNodes } from '../../src/rule/reach/dayLimits.js';
import { reach, reachByHalves, reachExactly } from '../../src/rule/reach/scan.js';

const SEED = { seed: 7, numRuns: 100 };

describe('laws of days', () => {
  it('at the lower limit so many good days or more have the chance 1 - confidence', () => {
    // Binomial tail summed term by term.
    const tail = (good: number, days: number, share: number): number => {
      let [term, below] = [(1 - share) ** days, 0];
      for (let i = 0; i < good; i++) {
        below += term;
        term *= ((days - i) / (i + 1)) * (share / (1 - share));
      }
      return 1 - below;
    };
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 80 }),
        fc.nat(),
        fc.double({ min: 0.6, max: 0.99, noNaN: true }),
        (days, k, confidence) => {
          const good = 1 + (k % days);
          const limit = goodDayShareLimit(good, days, confidence);
          expect(tail(good, days, limit)).toBeCloseTo(1 - confidence, 6);
        },
      ),
      SEED,
    );
  });
  it('the days needed are enough, and one fewer is not', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.5, max: 0.98, noNaN: true }),
        fc.double({ min: 0.6, max: 0.99, noNaN: true }),
        (share, confidence) => {
          const needed = daysNeeded(share, confidence);
          expect(share ** needed).toBeLessThanOrEqual(1 - confidence + 1e-9);
          expect(share ** (needed - 1)).toBeGreaterThan(1 - confidence - 1e-9);
        },
      ),
      SEED,
    );
  });
});

describe('laws of the day model', () => {
  const { rows } = simulateErrors({ seed: 2, days: 16, occupationsPerDay: { from: 15, to: 20 } });
  const nodes = dayNodes(dayModel(rows, fitErrorModel(rows, { component: 'vertical' })).posterior!);
  it('the variance at a confidence is the smallest that has it', () => {
    const limits = dayLimits(nodes, 0.9);
    fc.assert(
      fc.property(
        fc.double({ min: 0.3, max: 30, noNaN: true }),
        fc.double({ min: 0.5, max: 0.99, noNaN: true }),
        (km, confidence) => {
          const variance = limits.variance(km, confidence);
          expect(limits.confidence(km, variance * (1 + 1e-9))).toBeGreaterThanOrEqual(confidence - 1e-9);
          expect(limits.confidence(km, variance * (1 - 1e-6))).toBeLessThan(confidence + 1e-9);
        },
      ),
      { ...SEED, numRuns: 30 },
    );
  });
  it('falls with length and grows with room', () => {
    const limits = dayLimits(nodes, 0.9);
    fc.assert(
      fc.property(
        fc.double({ min: 0.3, max: 20, noNaN: true }),
        fc.double({ min: 1, max: 3, noNaN: true }),
        fc.double({ min: 50, max: 3000, noNaN: true }),
        (km, factor, variance) => {
          expect(limits.confidence(km * factor, variance)).toBeLessThanOrEqual(
            limits.confidence(km, variance) + 1e-12,
          );
          expect(limits.confidence(km, variance * factor)).toBeGreaterThanOrEqual(
            limits.confidence(km, variance) - 1e-12,
          );
        },
      ),
      SEED,
    );
  });
});

it('a limit leaves out what it was asked to', () => {
  const part = fc.record({
    variance: fc.double({ min: 1, max: 1e4, noNaN: true }),
    weight: fc.double({ min: 0.01, max: 1, noNaN: true }),
  });
  fc.assert(
    fc.property(
      fc.array(part, { minLength: 1, maxLength: 6 }),
      fc.double({ min: 1e-5, max: 0.3, noNaN: true }),
      fc.constantFrom('horizontal' as const, 'vertical' as const),
      (parts, share, component) => {
        const total = parts.reduce((sum, { weight }) => sum + weight, 0);
        const weights = Float64Array.from(parts, ({ weight }) => weight / total);
        const limit = limitOf(
          component,
          { variances: Float64Array.from(parts, ({ variance }) => variance), weights },
          share,
        );
        const outside = parts.reduce(
          (sum, { variance }, k) => sum + weights[k]! * (1 - shareWithin(component, limit, variance)),
          0,
        );
        expect(outside / share).toBeCloseTo(1, 3);
      },
    ),
    SEED,
  );
});

it('all ways of finding where something ends agree', () => {
  fc.assert(
    fc.property(
      fc.double({ min: 0, max: 30, noNaN: true }),
      fc.double({ min: 0.2, max: 25, noNaN: true }),
      (end, last) => {
        const holds = (km: number): boolean => km <= end;
        const steps = reach(holds, last);
        expect(reachByHalves(holds, last)).toEqual(steps);
        expect(steps.capped).toBe(last <= end);
        if (!steps.capped) {
          expect(steps.km).toBeLessThanOrEqual(end);
          expect(steps.km).toBeGreaterThan(end - 0.1 - 1e-9);
        }
        expect(Math.abs(reachExactly(holds, last) - Math.min(end, last))).toBeLessThan(1e-8);
      },
    ),
    SEED,
  );
});
