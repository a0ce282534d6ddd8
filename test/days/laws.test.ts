import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { simulateErrors } from '../../src/campaign/index.js';
import { degradedEvents } from '../../src/days/degradedDays.js';
import {
  DAY_COMBOS,
  dailyFactors,
  dayDependence,
  dayModel,
  dayModelNodes,
  dayPrior,
  dayQuantilePpm,
  moderatedDays,
  predictiveWeights,
  THETAS,
} from '../../src/days/index.js';
import { weekOf } from '../../src/days/weekClusters.js';
import { weightedQuantiles } from '../../src/days/weightedQuantile.js';
import { fitErrorModel } from '../../src/fit/index.js';
import { randomStream, shuffle } from '../../src/stats/index.js';
import { expectSentences } from './reference.js';

const rows = Object.freeze(
  simulateErrors({ seed: 21, days: 16, badDays: { runs: 1, runLength: 2 } }).rows.map((row) =>
    Object.freeze(row),
  ),
);
const runs = { seed: 11, numRuns: 8 };
const COMPONENTS = ['horizontal', 'vertical'] as const;

describe.each(COMPONENTS)('laws of the %s day model', (component) => {
  const modelOf = (errors: readonly object[]) => dayModel(errors, fitErrorModel(errors, { component }));
  const model = modelOf(rows);
  const { posterior: _, ...numbers } = model;

  it('does not depend on the order of rows, to the last bit', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 1e6 }), (seed) => {
        const { posterior, ...other } = modelOf(shuffle(rows, randomStream(seed)));
        expect(other).toEqual(numbers);
      }),
      runs,
    );
  });

  it('does not depend on the names of days', () => {
    const names = [...new Set(rows.map(({ day }) => day))];
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 1e6 }), (seed) => {
        const others = shuffle(names, randomStream(seed));
        const renamed = new Map(names.map((name, d) => [name, others[d]!]));
        const found = modelOf(rows.map((row) => ({ ...row, day: renamed.get(row.day)! })));
        expect(found.longRunPpm.high!).toBeCloseTo(model.longRunPpm.high!, 9);
        expect(new Set(found.degradedDays)).toEqual(
          new Set(model.degradedDays!.map((day) => renamed.get(day))),
        );
        for (const { day, factor, probabilityDegraded } of model.dayEstimates) {
          const same = found.dayEstimates.find((each) => each.day === renamed.get(day))!;
          expect(same.factor.estimate).toBeCloseTo(factor.estimate, 8);
          expect(same.probabilityDegraded).toBeCloseTo(probabilityDegraded, 8);
        }
      }),
      runs,
    );
  });

  it('scales the ppm and not the factors when errors scale', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.01, max: 100, noNaN: true }), (c) => {
        const scaled = modelOf(
          rows.map((row) => ({ ...row, east: c * row.east, north: c * row.north, up: c * row.up })),
        );
        expect(scaled.medianDayPpm.estimate! / c / model.medianDayPpm.estimate!).toBeCloseTo(1, 8);
        expect(scaled.longRunPpm.high! / c / model.longRunPpm.high!).toBeCloseTo(1, 8);
        expect(scaled.tau).toEqual(model.tau);
        expect(scaled.degradedDays).toEqual(model.degradedDays);
      }),
      runs,
    );
  });

  it('has ordered limits, and quantiles that grow with the share of days and with the level', () => {
    for (const { low, estimate, high } of [model.medianDayPpm, model.longRunPpm, model.tau]) {
      expect(low!).toBeLessThanOrEqual(estimate!);
      expect(estimate!).toBeLessThanOrEqual(high!);
    }
    fc.assert(
      fc.property(
        fc.double({ min: 0.05, max: 0.9, noNaN: true }),
        fc.double({ min: 0.05, max: 0.9, noNaN: true }),
        (share, level) => {
          const [at, above] = dayQuantilePpm(model.posterior!, share, [level, level + 0.09]);
          expect(above!).toBeGreaterThanOrEqual(at!);
          if (share < 0.5) return;
          const [more] = dayQuantilePpm(model.posterior!, share + 0.09, [level]);
          expect(more!).toBeGreaterThanOrEqual(at! * 0.999999);
        },
      ),
      { seed: 3, numRuns: 50 },
    );
    expect(dayQuantilePpm(model.posterior!, 0.5, [0.5])[0]).toBeCloseTo(model.medianDayPpm.estimate!, 12);
  });

  it('gives a factor for every day, with its limits', () => {
    const factors = dailyFactors(model);
    expect(factors.map(({ day }) => day)).toEqual([...new Set(rows.map(({ day }) => day))].sort());
    for (const { factor, low, high, degraded } of factors) {
      expect(low).toBeLessThan(factor);
      expect(factor).toBeLessThan(high);
      expect(typeof degraded).toBe('boolean');
    }
  });

  it('is what the middle node is, and nodes of other constants are other models', () => {
    const nodes = dayModelNodes(model.posterior!);
    expect(nodes.reduce((sum, { weight }) => sum + weight, 0)).toBeCloseTo(1, 12);
    expect(nodes[3]!.comboWeights).toBe(model.posterior!.comboWeights);
    for (const [k, { A, comboWeights }] of nodes.entries()) {
      if (k > 0) expect(A).toBeGreaterThan(nodes[k - 1]!.A);
      expect(comboWeights.reduce((a, b) => a + b)).toBeCloseTo(1, 12);
    }
    // A larger constant leaves less to the ppm.
    const median = (k: number) =>
      weightedQuantiles(
        Float64Array.from(DAY_COMBOS, (combo) => combo.median),
        nodes[k]!.comboWeights,
        [0.5],
      )[0]!;
    expect(median(6)).toBeLessThan(median(0));
  });

  it('predicts a day with probabilities that sum to 1', () => {
    const weights = predictiveWeights(model.posterior!.comboWeights);
    expect(weights).toHaveLength(THETAS.length);
    expect(weights.reduce((a, b) => a + b)).toBeCloseTo(1, 12);
  });

  it('agrees with moderated variances on the order of the worst and the best day', () => {
    const each = moderatedDays(rows, fitErrorModel(rows, { component }));
    const worst = each.reduce((a, b) => (b.moderatedRatio > a.moderatedRatio ? b : a)).day;
    expect(model.dayEstimates.find(({ day }) => day === worst)!.factor.estimate).toBeGreaterThan(1.2);
  });
});

it('has a prior of which every combo sums to 1', () => {
  const prior = dayPrior();
  for (let j = 0; j < DAY_COMBOS.length; j++) {
    let total = 0;
    for (let k = 0; k < THETAS.length; k++) total += prior[j * THETAS.length + k]!;
    expect(Math.abs(total - 1)).toBeLessThan(1e-12);
  }
});

describe('what the day model says', () => {
  const said = (errors: readonly object[]) => {
    const { notes, ...model } = dayModel(errors, fitErrorModel(errors, { component: 'horizontal' }));
    expectSentences(notes);
    return { ...model, text: notes.map(({ text }) => text).join(' ') };
  };

  it('of data without growth', () => {
    const flat = simulateErrors({ seed: 4, days: 20, ppm: { east: 0, north: 0, up: 0 } }).rows;
    const { text, medianDayPpm, degradedDays, dayEstimates } = said(flat);
    expect(text).toBe(
      'Day differences cannot be judged: the ppm is not clear of zero. Add days with shots farther from the base.',
    );
    expect([medianDayPpm.estimate, degradedDays, dayEstimates.length]).toEqual([null, null, 0]);
  });

  it('of few shots a day: the spread alone, and no names', () => {
    const { text, degradedDays, tau } = said(simulateErrors({ seed: 5, days: 40, habitual: {} }).rows);
    expect(degradedDays).toBeNull();
    expect(text).toContain(
      `occupations on the usual day degraded days cannot be named; only the spread of the log of the ppm between days is told, ${tau.estimate!.toFixed(2)}. Take 10 or more occupations a day.`,
    );
  });

  it('of few days', () => {
    expect(said(rows.filter(({ day }) => day < '2025-03-12')).text).toContain(
      'With 7 days degraded days cannot',
    );
  });

  it('of bad days: how many in a row, how bad, and that the ground comes before the sky', () => {
    const bad = { runs: 1, runLength: 3, factor: { from: 4, to: 5 } };
    const { text, events } = said(
      simulateErrors({ seed: 22, days: 20, dayFactorLogSd: 0.15, badDays: bad }).rows,
    );
    expect(events).toHaveLength(1);
    expect(text).toMatch(
      /^On 3 days in a row, \S+ to \S+, the horizontal ppm was \d\.\d to \d\.\d times that of the median day\. Look for a cause/,
    );
  });

  it('of the absence of bad days among few', () => {
    const { text } = said(simulateErrors({ seed: 8, days: 15, dayFactorLogSd: 0.1 }).rows);
    expect(text).toContain('No degraded day among 15 leaves room for a share of up to 20 %');
  });

  it('of days without far shots', () => {
    const near = rows.filter(({ day, baselineKm }) => day > '2025-03-04' || baselineKm < 5);
    expect(said(near).text).toMatch(
      /2 of 16 days have no shot beyond \d+\.\d km and could hardly be found degraded/,
    );
  });

  it('of errors without times: it asks for them', () => {
    const bare = rows.map(({ startMs: _, ...row }) => row);
    expect(() => said(bare)).toThrow(/Expected a column "startMs"/);
  });
});

describe('events', () => {
  const days = ['2025-03-06', '2025-03-07', '2025-03-10', '2025-03-11', '2025-04-01'];
  it('go over a weekend, and end at an ordinary day or a long break', () => {
    expect(degradedEvents(days, ['2025-03-07', '2025-03-10']).map((event) => event.days)).toEqual([
      ['2025-03-07', '2025-03-10'],
    ]);
    expect(degradedEvents(days, ['2025-03-06', '2025-03-10'])).toHaveLength(2);
    expect(degradedEvents(days, ['2025-03-11', '2025-04-01'])).toHaveLength(2);
  });
  it('take neighbours of other names as consecutive', () => {
    expect(degradedEvents(['a', 'b', 'c'], ['a', 'b'])).toHaveLength(1);
  });
});

describe('weeks', () => {
  it('begin on Monday', () => {
    // 2025-03-03 was a Monday (calendar).
    expect(['2025-03-03', '2025-03-09', '2025-03-10', '1969-12-31'].map(weekOf)).toEqual([
      '2025-03-03',
      '2025-03-03',
      '2025-03-10',
      '1969-12-29',
    ]);
    expect(weekOf('day 7')).toBeNull();
  });

  /** Twenty-four weeks, each with a factor of its own on all of its days, or each day with its own. */
  const dependence = (alike: boolean) => {
    const whole = simulateErrors({
      seed: 31,
      days: 120,
      dayFactorLogSd: 0.02,
      occupationsPerDay: { from: 20, to: 30 },
    });
    const random = randomStream(9, alike ? 'weeks' : 'days');
    const factors = new Map<string, number>();
    const changed = whole.rows.map((row) => {
      const key = alike ? weekOf(row.day)! : row.day;
      if (!factors.has(key)) factors.set(key, Math.exp(1.2 * (random() + random() - 1)));
      const wanted = Math.hypot(7.8, factors.get(key)! * 0.78 * row.baselineKm);
      const scale = wanted / Math.hypot(7.8, 0.78 * row.baselineKm);
      return { ...row, east: scale * row.east, north: scale * row.north };
    });
    const model = fitErrorModel(changed, { component: 'horizontal' });
    return dayDependence(changed, model, dayModel(changed, model).dayEstimates);
  };
  it('replace days when the days of a week are alike, and not otherwise', () => {
    const together = dependence(true);
    expect(together.cluster).toBe('week');
    expect(together.weeks).toBe(24);
    expect(together.lagOneCorrelation!).toBeGreaterThan(0.4);
    expect(together.notes[0]!.text).toMatch(
      /^Days that follow each other are alike \(correlation .* 0\.\d\d\)/,
    );
    const apart = dependence(false);
    expect(apart.cluster).toBe('day');
    expect(Math.abs(apart.lagOneCorrelation!)).toBeLessThan(0.3);
    expect(apart.notes).toEqual([]);
  });
  it('are not told where days are no dates', () => {
    const named = rows.map((row) => ({ ...row, day: `day ${row.day}` }));
    const model = fitErrorModel(named, { component: 'horizontal' });
    const found = dayDependence(named, model, []);
    expect([found.weeks, found.standardErrorRatio, found.lagOneCorrelation]).toEqual([0, null, null]);
  });
});
