import { expect, it } from 'vitest';
import { simulateErrors } from '../../src/campaign/index.js';
import { dayModel, timeOfDay } from '../../src/days/index.js';
import { fitErrorModel } from '../../src/fit/index.js';
import { median, randomStream } from '../../src/stats/index.js';

// Long runs of the same kind are in test/bench/days.ts. Over 150 campaigns the power is 0.8-0.9 and the false share at most
// 0.1; twelve campaigns with two bad days each leave a standard error of about 0.07.
it('finds at least 15 of 24 bad days of 12 campaigns of 30 days, and names at most 4 others', () => {
  let [found, wrong] = [0, 0];
  for (let seed = 1; seed <= 12; seed++) {
    const { rows, truth } = simulateErrors({
      seed: 300 + seed,
      days: 30,
      dayFactorLogSd: 0.25,
      badDays: { runs: 2, runLength: 1 },
    });
    const named = new Set(dayModel(rows, fitErrorModel(rows, { component: 'horizontal' })).degradedDays);
    const usual = median(truth.days.map(({ factor }) => factor));
    for (const { day, factor, bad } of truth.days) {
      if (bad && named.has(day)) found += 1;
      if (named.has(day) && factor < 1.5 * usual) wrong += 1;
    }
  }
  expect(found).toBeGreaterThanOrEqual(15);
  expect(wrong).toBeLessThanOrEqual(4);
});

it('names no day of 10 campaigns whose days are all alike', () => {
  for (let seed = 1; seed <= 10; seed++) {
    const { rows } = simulateErrors({ seed: 400 + seed, days: 30, dayFactorLogSd: 0 });
    expect(dayModel(rows, fitErrorModel(rows, { component: 'vertical' })).degradedDays).toEqual([]);
  }
});

// Level 5 %: of 40 tests 2 are expected, 7 or more have a chance below 0.004.
it('calls hours different in at most 6 of 40 tests where they are not', () => {
  let different = 0;
  for (let seed = 1; seed <= 20; seed++) {
    const { rows } = simulateErrors({ seed: 500 + seed, days: 20 });
    for (const component of ['horizontal', 'vertical'] as const) {
      const model = fitErrorModel(rows, { component });
      const { pValue } = timeOfDay(rows, model, { random: randomStream(seed, component) });
      if (pValue! <= 0.05) different += 1;
    }
  }
  expect(different).toBeLessThanOrEqual(6);
});
