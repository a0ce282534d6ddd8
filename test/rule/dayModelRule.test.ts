import { describe, expect, it } from 'vitest';
import { type CampaignOptions, simulateErrors } from '../../src/campaign/index.js';
import { dayModel, dayModelOf, dayQuantilePpm } from '../../src/days/index.js';
import {
  estimateVariance,
  fitErrorModel,
  fitTerms,
  sigmaAtMm,
  type WrongFixGrowth,
} from '../../src/fit/index.js';
import {
  crowdedDaysKept,
  daysNeeded,
  findFormDoubt,
  formDoubt,
  goodDayShareLimit,
  heightAllowance,
  lengthWithin,
  maximumBaseline,
  promiseAtKm,
  type RuleOptions,
  reviewBy,
  ruleByHour,
  ruleBySeason,
  ruleTable,
  toleranceFactor,
} from '../../src/rule/index.js';
import { prepareGround, reachOf } from '../../src/rule/reach/preparedGround.js';
import { axisData } from '../days/reference.js';
import { referenceFits } from '../fit/reference.js';
import { marksGround, suspecting, tolerance } from './reference.js';

// Source: R 4.2 (fixtures/fits, recipe make_ref4.R): repeatability fit, growing wrong fixes at their 80 % quantile, seven
// values of the constant, the same grids. T = 40 mm vertical, 30 mm radial.
describe.each([
  ['known', 'vertical', 'U', 1e-8],
  ['known', 'horizontal', 'H', 1e-8],
  ['em', 'horizontal', 'H', 1e-4],
] as const)('with %s wrong fixes the %s rule equals R', (block, component, letter, close) => {
  const ground = marksGround(component, block);
  const expected = referenceFits('ref4_marks')[block][letter].repeatability.rule;
  const asked = tolerance(expected.T_mm, { component });
  const used = ground.errors.filter((_, i) => ground.weights[i]! >= 0.5);
  it('in the confidence at 5 and 8 km', () => {
    const { confidence } = reachOf(prepareGround(ground, {}), asked);
    expect(Math.abs(confidence!(5) - expected.conf_at_5km)).toBeLessThan(close);
    expect(Math.abs(confidence!(8) - expected.conf_at_8km)).toBeLessThan(close);
  });
  it('in the maximum baseline and the wrong fixes reckoned with', () => {
    const rule = maximumBaseline(used, ground.model, asked, ground);
    expect(rule.method).toBe('day-model');
    expect(rule.maximumBaselineKm).toBe(expected.Lmax_km);
    expect(rule.wrongFixShare! / expected.eps80_at_Lmax).toBeCloseTo(1, 6);
  });
});

// Source: R 4.2 (fixtures/fits): the share as it stands, one value of the constant, no cap.
it.each(['ref1_mild15', 'ref3_linear_base10'])('the plain formula on %s equals R', (name) => {
  const data = axisData(name, 'up');
  const { A, B } = estimateVariance(data);
  const { hier } = referenceFits(name).U;
  const model = dayModelOf(data, { A, B, standardErrorA: 0, standardErrorB: 0, independentErrorB: 0 });
  const [median, upper] = dayQuantilePpm(model.posterior!, 0.9, [0.5, 0.95]) as [number, number];
  const allowed = hier.T_mm / toleranceFactor('vertical', 0.95);
  expect((lengthWithin(A, upper ** 2, allowed) ?? 0) / hier.Lmax_lower95_km).toBeCloseTo(1, 8);
  expect((lengthWithin(A, median ** 2, allowed) ?? 0) / hier.Lmax_point_km).toBeCloseTo(1, 8);
});

const campaign = (more: CampaignOptions = {}, seed = 12) => simulateErrors({ seed, days: 30, ...more }).rows;
const rows = campaign();
const model = fitErrorModel(rows, { component: 'horizontal' });
const days = dayModel(rows, model);
const rule = (limitMm: number, more: Parameters<typeof tolerance>[1] = {}, options: RuleOptions = {}) =>
  maximumBaseline(rows, model, tolerance(limitMm, more), { dayModel: days, ...options });

describe('a rule of days', () => {
  it('is shorter than its best estimate, and longer for fewer days, fewer positions, less confidence', () => {
    const limit = rule(25);
    expect(limit.maximumBaselineKm!).toBeLessThan(limit.bestEstimateKm!);
    expect(limit.maximumBaselineKm!).toBeLessThan(rule(25, { dayShare: 0.5 }).maximumBaselineKm!);
    expect(limit.maximumBaselineKm!).toBeLessThan(rule(25, { share: 0.68 }).maximumBaselineKm!);
    expect(limit.maximumBaselineKm!).toBeLessThan(rule(25, { confidence: 0.7 }).maximumBaselineKm!);
    expect(limit.maximumBaselineKm!).toBeLessThan(limit.allDaysKm!);
  });
  it('for 99 % is never longer than the mixture over all days allows', () => {
    const rare = rule(40, { share: 0.99 });
    expect(rare.maximumBaselineKm!).toBeGreaterThan(0);
    expect(rare.maximumBaselineKm!).toBeLessThanOrEqual(rare.allDaysKm!);
    expect(rare.remarks.join(' ')).toContain('rare errors are larger');
  });
  it('contains the stated error of the base, and says when none was stated', () => {
    const stated = rule(25, {}, { baseSigmaMm: 4 });
    expect(stated.maximumBaselineKm!).toBeLessThan(rule(25).maximumBaselineKm!);
    expect(stated.remarks.join(' ')).toContain('4 mm per axis, is in the rule');
    expect(rule(25).remarks.join(' ')).toContain('not in the rule because it was not stated');
    expect(rule(25, {}, { baseSigmaMm: 40 })).toMatchObject({
      maximumBaselineKm: 0,
      reason: expect.stringContaining("come from the base's coordinates"),
    });
  });
  it('takes the ppm of an assumed base coordinate off the limit in full', () => {
    // Common practice: metres / 20. 5 m are 0.25 ppm, 2.5 mm at 10 km, the same on all positions.
    const stated = rule(25, {}, { basePpm: 0.25 });
    const plain = rule(25);
    expect(stated.maximumBaselineKm!).toBeLessThan(plain.maximumBaselineKm!);
    const at = stated.maximumBaselineKm!;
    expect(rule(25 - 0.25 * at).maximumBaselineKm!).toBeCloseTo(at, 6);
    expect(stated.conditions.basePpm).toBe(0.25);
    expect(plain.conditions.basePpm).toBeNull();
    expect(stated.remarks.join(' ')).toContain('the 0.25 ppm that its error adds to every baseline');
    expect(stated.remarks.join(' ')).not.toContain('was not stated');
    // What can be promised grows by just that much, and a rare share too.
    for (const share of [0.95, 0.99]) {
      const options = { dayModel: days, share };
      const [without, withIt] = [{}, { basePpm: 0.25 }].map(
        (more) => promiseAtKm(rows, model, 8, { ...options, ...more }).limitMm!,
      );
      expect(withIt! - without!).toBeCloseTo(0.25 * 8, 3);
    }
    const cell = ruleTable(rows, model, {
      dayModel: days,
      basePpm: 0.25,
      limitsMm: [25],
      shares: [0.95],
    })[0]!;
    expect(cell.maximumBaselineKm).toBe(at);
  });
  it('counts the larger spread of both forms where they cannot be told apart', () => {
    const linear = fitErrorModel(rows, { component: 'horizontal', form: 'linear-sum' });
    expect(formDoubt(model, { verdict: 'root-sum-square' }, linear)).toBeNull();
    expect(formDoubt(model, { verdict: 'linear-sum' }, null)).toBeNull();
    const doubt = formDoubt(model, { verdict: 'cannot be told apart' }, linear)!;
    for (const km of [0.5, 2, 8, 15, 40]) {
      const [own, other] = [sigmaAtMm(model, km), sigmaAtMm(linear, km)];
      expect(doubt.ratioAt(km)).toBeCloseTo(own / Math.max(own, other), 12);
    }
    const doubted = rule(30, {}, { formDoubt: doubt });
    expect(doubted.maximumBaselineKm!).toBeLessThan(rule(30).maximumBaselineKm!);
    expect(doubted.remarks.join(' ')).toContain('at each length the larger spread of both counts');
    const promised = (more: RuleOptions) => promiseAtKm(rows, model, 8, { dayModel: days, ...more }).limitMm!;
    expect(promised({ formDoubt: doubt }) / promised({})).toBeCloseTo(1 / doubt.ratioAt(8), 9);
    // Errors made to follow the linear sum are never preferred as root-sum-square here, and so in doubt.
    const grown = rows.map((row) => {
      const along = 0.778 * row.dayFactor * row.baselineKm;
      const factor = (7.78 + along) / Math.hypot(7.78, along);
      return { ...row, east: factor * row.east, north: factor * row.north };
    });
    const found = findFormDoubt(grown, fitErrorModel(grown, { component: 'horizontal' }));
    expect(found).toMatchObject({ other: 'linear-sum' });
    expect(found!.ratioAt(8)).toBeLessThan(1);
  });
  it('states its conditions, and is to be looked at again after a year', () => {
    const { conditions } = rule(
      25,
      {},
      {
        visits: [{ fixedRows: 5 }, { fixedRows: 0 }, { fixedRows: 4 }, { fixedRows: 1 }],
        f107: new Map([
          [rows[0]!.day, 150],
          [rows.at(-1)!.day, 190],
        ]),
      },
    );
    expect(conditions).toMatchObject({ visitsWithFix: 0.75, f107: { from: 150, to: 190 }, epochs: null });
    expect(conditions.solarHours!.from).toBeLessThan(conditions.solarHours!.to);
    expect(conditions.reviewBy).toBe(`2026${conditions.to.slice(4)}`);
    expect([reviewBy('2024-02-29'), reviewBy('day 3')]).toEqual(['2025-02-28', null]);
  });
});

describe('wrong fixes', () => {
  const { screening, wrongFixes, ...ground } = marksGround('horizontal', 'known');
  const used = ground.errors.filter((_, i) => ground.weights[i]! >= 0.5);
  const of = (growth: WrongFixGrowth, more = {}) =>
    maximumBaseline(used, ground.model, tolerance(30, more), { ...ground, wrongFixes: growth });
  it('shorten a rule, and defeat a share that leaves no room for them', () => {
    const none = maximumBaseline(used, ground.model, tolerance(30), ground);
    expect(of(wrongFixes).maximumBaselineKm!).toBeLessThan(none.maximumBaselineKm!);
    expect(none.remarks.join(' ')).toContain('Wrong fixes were not searched for');
    expect(of(wrongFixes, { share: 0.999 })).toMatchObject({
      maximumBaselineKm: 0,
      reason: expect.stringMatching(/^wrong fixes alone defeat the share: 0.1 % of the positions may fail/),
    });
    expect(
      maximumBaseline(used, ground.model, tolerance(100, { share: 0.99 }), { ...ground, wrongFixes }).reason,
    ).toMatch(/^beyond \d.\d km wrong fixes alone defeat the share/);
  });
  it('that crowd on a day count in whichever way gives the shorter rule', () => {
    expect(crowdedDaysKept(ground.errors, ground.model, screening)).toBeNull();
    const day = ground.errors[200]!.day;
    const crowd = ground.errors.flatMap((row, i) => (row.day === day ? [i] : []));
    const crowded = {
      ...suspecting([...screening.suspected, ...crowd], ground.errors.length),
      crowdedDays: [day],
    };
    const kept = crowdedDaysKept(ground.errors, ground.model, crowded)!;
    expect(kept.wrongFixes!.suspected).toBe(screening.suspected.length);
    const without = maximumBaseline(used, ground.model, tolerance(30), { ...ground, wrongFixes });
    const both = maximumBaseline(used, ground.model, tolerance(30), {
      ...ground,
      wrongFixes,
      crowdedDaysKept: kept,
    });
    expect(both.maximumBaselineKm!).toBeLessThanOrEqual(without.maximumBaselineKm!);
    const bad = maximumBaseline(used, ground.model, tolerance(30), {
      ...ground,
      crowdedDaysKept: { ...ground, wrongFixes },
    });
    expect(bad.maximumBaselineKm).toBe(without.maximumBaselineKm);
    expect(bad.remarks.join(' ')).toContain('the shorter of those with and without');
  });
});

describe('what the order of days says alone', () => {
  // ln 0.05/ln 0.9 = 28.4, ln 0.05/ln 0.95 = 58.4 (Wilks 1941; from memory).
  it('needs 29 days for 90 % and 59 for 95 %', () => {
    expect([daysNeeded(0.9, 0.95), daysNeeded(0.95, 0.95)]).toEqual([29, 59]);
    expect(goodDayShareLimit(29, 29, 0.95)).toBeCloseTo(0.05 ** (1 / 29), 10);
    // R: binom.test(30, 34, alternative = "greater")$conf.int[1] = qbeta(.05, 30, 5), by the F quantile of the same law.
    expect(goodDayShareLimit(0, 10, 0.95)).toBe(0);
  });
  it('is told as too little below, and as a length above', () => {
    expect(rule(25, { dayShare: 0.95 }).dayBound).toMatchObject({
      daysNeeded: 59,
      baselineKm: null,
      sentence: expect.stringContaining('that takes 59 days with far shots'),
    });
    const { dayBound, allDaysKm } = rule(25);
    expect(dayBound!.days).toBe(30);
    expect(dayBound!.sentence).toContain('the worst of 30 days bounds 90 % of them');
    expect(dayBound!.baselineKm!).toBeLessThan(allDaysKm!);
  });
});

describe('no rule, and what to collect next', () => {
  it('from marks in one direction', () => {
    const oneWay = rows.map((row) => ({ ...row, azimuthDeg: 100 + (row.azimuthDeg % 50) }));
    expect(maximumBaseline(oneWay, model, tolerance(25), { dayModel: days })).toMatchObject({
      maximumBaselineKm: null,
      reason: expect.stringMatching(
        /^all marks lie within a sector of \d+° .* add marks in other directions/,
      ),
    });
  });
  it('from short shots alone', () => {
    const short = rows.filter(({ baselineKm }) => baselineKm < 3);
    const fit = fitErrorModel(short, { component: 'horizontal' });
    const { maximumBaselineKm, reason } = maximumBaseline(short, fit, tolerance(25), {
      dayModel: dayModel(short, fit),
    });
    expect(maximumBaselineKm).toBeNull();
    expect(reason).toMatch(/add (days with far shots|marks)/);
  });
  it('for a tolerance that cannot be', () => {
    expect(() => rule(0)).toThrow('Expected a number above 0 as limitMm of a tolerance, came 0.');
    expect(() => rule(25, { share: 1 })).toThrow('Expected a number between 0 and 1 as share');
    expect(() => rule(25, { component: 'vertical' })).toThrow('that of the model');
  });
});

describe('many rules at once', () => {
  it('a table has what single rules say', () => {
    const table = ruleTable(rows, model, { dayModel: days, limitsMm: [20, 30], shares: [0.68, 0.95, 0.99] });
    expect(table).toHaveLength(6);
    for (const row of table) {
      expect(row.maximumBaselineKm).toBe(rule(row.limitMm, { share: row.share }).maximumBaselineKm);
    }
  });
  it('a promise at the length of a rule is the limit of the rule', () => {
    for (const more of [{}, { share: 0.99 }, { dayShare: 0.5 }]) {
      const { maximumBaselineKm: km } = rule(30, more);
      const at = promiseAtKm(rows, model, km!, { dayModel: days, ...more });
      expect(at.limitMm!).toBeLessThanOrEqual(30 + 1e-4);
      expect(promiseAtKm(rows, model, km! + 0.1, { dayModel: days, ...more }).limitMm!).toBeGreaterThan(
        30 - 1e-4,
      );
      expect(at.bestEstimateMm!).toBeLessThan(at.limitMm!);
    }
    const pooled = maximumBaseline(rows, model, tolerance(25));
    expect(promiseAtKm(rows, model, pooled.maximumBaselineKm! + 0.1).limitMm!).toBeGreaterThan(25);
    expect(promiseAtKm(rows, model, 500, { dayModel: days }).reason).toContain(
      'nothing can be promised at 500.0 km',
    );
  });
  it('hours and months stand on their own shots, or give the reason', () => {
    const worse = campaign({ days: 50, middayRise: 0.5, occupationsPerDay: { from: 60, to: 90 } });
    const fit = fitErrorModel(worse, { component: 'horizontal' });
    const hours = ruleByHour(worse, fit, tolerance(25));
    expect(hours).toHaveLength(3);
    const [morning, midday] = hours.map(({ rule: own }) => own.maximumBaselineKm!) as [number, number];
    expect(midday).toBeLessThan(morning);
    const months = ruleBySeason(worse, fit, tolerance(25));
    expect(months.map(({ group }) => group)).toContain('March');
    expect(months.find(({ group }) => group === 'May')!.rule.reason).toMatch(/days? (is|are) too few/);
  });
});

it('a site far above its base has a shorter vertical rule', () => {
  const high = rows.map((row, i) => ({
    ...row,
    up: row.up + 0.04 * Math.abs(row.heightDifferenceM) * Math.sin(7 * i) * Math.SQRT2,
  }));
  const fit = fitErrorModel(high, { component: 'vertical' });
  const terms = fitTerms(high, { component: 'vertical', terms: ['height-difference'] });
  const asked = tolerance(60, { component: 'vertical' });
  const ground = { dayModel: dayModel(high, fit) };
  const level = maximumBaseline(high, fit, asked, ground);
  const steep = maximumBaseline(high, fit, asked, { ...ground, height: heightAllowance(terms, 150) });
  expect(steep.maximumBaselineKm!).toBeLessThan(level.maximumBaselineKm!);
  expect(steep.conditions.heightDifferenceM).toBe(150);
  const beyond = { ...ground, height: heightAllowance(terms, -950, 400) };
  expect(maximumBaseline(high, fit, asked, beyond)).toMatchObject({
    maximumBaselineKm: null,
    reason:
      'the site lies 950 m above or below its base and the shots at most 400 m: add marks at such height differences',
  });
  expect(() => heightAllowance({ ...terms, terms: [] }, 100)).toThrow(
    'upper limit of the height-difference term',
  );
});
