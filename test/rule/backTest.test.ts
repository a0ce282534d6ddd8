import { describe, expect, it } from 'vitest';
import { simulateErrors } from '../../src/campaign/index.js';
import { comboFit } from '../../src/days/comboFit.js';
import { dayCells, dayLogLikelihood, relativeLikelihood } from '../../src/days/dayLikelihood.js';
import { dayModel, fittedData, nodesWithoutDay } from '../../src/days/index.js';
import { errorColumns } from '../../src/errors/index.js';
import { fitErrorModel, wrongFixGrowth } from '../../src/fit/index.js';
import { pickEntries } from '../../src/fit/prepareErrors.js';
import { scoreShots } from '../../src/rule/backtest/score.js';
import { train } from '../../src/rule/backtest/train.js';
import {
  backTest,
  crowdedDaysKept,
  forwardTest,
  leaveGroupOut,
  maximumBaseline,
} from '../../src/rule/index.js';
import { studentTQuantile } from '../../src/stats/index.js';
import { marksGround, suspecting, tolerance } from './reference.js';

describe('the score of judged shots', () => {
  // By hand: 6 of 8 inside; days with 3 of 4, 2 of 2 and 1 of 2. Σ (hits - 0.75 n)² = 0 + 0.25 + 0.25, G/(G - 1) = 1.5.
  const errorMm = Float64Array.of(1, 1, 1, 9, 2, 2, 3, 8);
  const shots = {
    days: ['a', 'a', 'a', 'a', 'b', 'b', 'c', 'c'],
    baselineKm: Float64Array.of(1, 1, 6, 6, 12, 12, 25, 25),
    errorMm,
    limitMm: new Float64Array(8).fill(5),
    weights: new Float64Array(8).fill(1),
    logDensity: null,
  };
  const score = scoreShots(shots, 0.7, 0.95)!;
  it('counts shots and days', () => {
    expect(score).toMatchObject({ observedShare: 0.75, occupations: 8, days: 3, goodDays: 2 });
    expect(score.goodDayShare).toBeCloseTo(2 / 3, 12);
  });
  it('has the interval that counts days', () => {
    const half = studentTQuantile(0.975, 2) * Math.sqrt((1.5 * 0.5) / 64);
    expect(score.low!).toBeCloseTo(0.75 - half, 10);
    expect(score.high).toBe(1);
  });
  it('has the pinball loss (p - 1{inside})(|e| - Q)', () => {
    const loss = [4, 4, 4, 3, 3, 2].reduce((sum, below) => sum + 0.3 * below, 0) + 0.7 * (4 + 3);
    expect(score.pinballMm).toBeCloseTo(loss / 8, 12);
  });
  it('divides by length, and does not call 2 of 2 certain', () => {
    expect(
      score.lengthClasses.map(({ fromKm, toKm, observedShare }) => [fromKm, toKm, observedShare]),
    ).toEqual([
      [0, 5, 1],
      [5, 10, 0.5],
      [10, 20, 1],
      [20, null, 0.5],
    ]);
  });
  it('is null without shots', () => {
    expect(scoreShots({ ...shots, days: [] }, 0.7, 0.95)).toBeNull();
  });
});

const spec = {
  horizontal: { constantMm: 3, ppm: 0.3 },
  vertical: { constantMm: 6, ppm: 0.5 },
  form: 'linear-sum',
  axis: 'radial',
  level: 'rms',
} as const;

describe('leaving out each day', () => {
  const { rows } = simulateErrors({ seed: 3, days: 25, occupationsPerDay: { from: 20, to: 30 } });
  const model = fitErrorModel(rows, { component: 'horizontal' });
  const options = { dayModel: dayModel(rows, model), tolerances: [tolerance(25)], specSheet: spec };
  const found = backTest(rows, model, options);
  it('finds the share inside that the limits are for, and fewer for a spec sheet that is too good', () => {
    expect(found.own!.low!).toBeLessThan(0.95);
    expect(found.own!.high!).toBeGreaterThan(0.95);
    expect(found.predictive!.observedShare).toBeGreaterThan(0.92);
    expect(found.specSheet!.high!).toBeLessThan(0.95);
    expect(found.specSheet!.logScore!).toBeLessThan(found.own!.logScore!);
    expect(found.specSheet!.pinballMm).toBeGreaterThan(found.own!.pinballMm);
  });
  it('counts the rule out and lists what missed it', () => {
    const [count] = found.rules;
    expect(count!.shots - count!.held).toBe(count!.failures.length);
    for (const shot of count!.failures) {
      expect(shot.errorMm).toBeGreaterThan(25);
      expect(shot.baselineKm).toBeLessThanOrEqual(count!.lengthKm!.to + 1e-9);
    }
    expect(count!.sentence).toMatch(/^Of \d+ shots inside \d+\.\d( to \d+\.\d)? km \d+ held 25 mm; /);
    expect(found.specSheetRules[0]!.lengthKm!.from).toBeGreaterThan(count!.lengthKm!.to);
    expect(found.specSheetRules[0]!.failures.length).toBeGreaterThan(count!.failures.length);
  });
  it('judges nothing where distances are too alike, and says so', () => {
    const alike = rows.filter(({ mark }) => mark === rows[0]!.mark);
    const fit = fitErrorModel(alike, { component: 'horizontal' });
    const { own, predictive, rules, notes } = backTest(alike, fit, { tolerances: [tolerance(25)] });
    expect([own, predictive]).toEqual([null, null]);
    expect(rules[0]!.sentence).toContain('nothing can be counted');
    expect(notes[0]!.text).toMatch(
      /^\d+ days take no part in the back-test: .* Add days with both near and far shots\.$/,
    );
    expect(leaveGroupOut(alike, fit, { by: 'crew' }).every(({ score }) => score === null)).toBe(true);
  });
  it('refuses a reference that needs the judged day', () => {
    expect(() => backTest(rows, { ...model, reference: 'relative' })).toThrow(
      'cannot be known before its day',
    );
  });
});

describe('what a day is judged by', () => {
  const { errors, model, weights, dayModel: days } = marksGround('vertical', 'known');
  const day = errors[400]!.day;
  const others = [...errors.keys()].filter((row) => errors[row]!.day !== day);
  it('does not change with its own errors', () => {
    const trained = (rows: typeof errors) =>
      train(
        { records: rows, columns: errorColumns(rows), days: rows.map((row) => row.day), weights, model },
        others,
      );
    const worse = errors.map((row) => (row.day === day ? { ...row, up: 9 * row.up + 50 } : row));
    expect(trained(worse)).toEqual(trained(errors));
    expect(trained(errors).fitted.p).not.toBe(model.fitted.p);
  });
  it('is, of the day model, that of the other days', () => {
    const { posterior } = days;
    const data = fittedData(errors, model, weights);
    const rest = dayCells(
      pickEntries(
        data,
        [...data.day.keys()].filter((i) => data.day[i] !== day),
      ),
    );
    for (const { A, comboWeights } of nodesWithoutDay(posterior!)(day)) {
      const { B, effectiveShare } = posterior!;
      const { weights: expected } = comboFit(
        relativeLikelihood(dayLogLikelihood(rest, A, B, effectiveShare)),
      );
      comboWeights.forEach((weight, j) => {
        if (expected[j]! > 1e-8) expect(weight / expected[j]!).toBeCloseTo(1, 6);
      });
    }
  });
});

describe('suspected wrong fixes', () => {
  const { errors, model, screening, dayModel: days } = marksGround('horizontal', 'known');
  it('fail the rule that is counted out, and are told apart', () => {
    const { own, rules } = backTest(errors, model, {
      screening,
      dayModel: days,
      tolerances: [tolerance(30)],
    });
    expect(own!.shareWithSuspects).toBeLessThan(own!.observedShare);
    const suspected = rules[0]!.failures.filter((shot) => shot.suspected);
    const near = screening.suspected.filter((row) => errors[row]!.baselineKm < rules[0]!.lengthKm!.from);
    expect(suspected.length).toBeGreaterThanOrEqual(near.length);
    expect(near.length).toBeGreaterThan(0);
  });
  it('that crowd on a day are judged by the shorter rule, as it is made', () => {
    const shots = simulateErrors({ seed: 5, days: 24, occupationsPerDay: { from: 12, to: 16 } }).rows;
    const { day } = shots[100]!;
    const crowd = shots
      .flatMap((row, i) => (row.day === day ? [i] : []))
      .sort((i, j) => shots[j]!.baselineKm - shots[i]!.baselineKm)
      .slice(0, 4);
    // A bad day, or a burst of wrong fixes: the rule must hold for either.
    const bad = shots.map((row, i) => (crowd.includes(i) ? { ...row, up: 8 * row.up } : row));
    const crowded = { ...suspecting(crowd, bad.length), crowdedDays: [day] };
    const { weights } = crowded;
    const fit = fitErrorModel(bad, { component: 'vertical', weights });
    const options = {
      screening: crowded,
      dayModel: dayModel(bad, fit, weights),
      tolerances: [tolerance(40, { component: 'vertical' as const, share: 0.9 })],
    };
    const [plain, both] = [null, crowdedDaysKept(bad, fit, crowded)].map(
      (kept) => backTest(bad, fit, { ...options, crowdedDaysKept: kept }).rules[0]!.lengthKm!,
    );
    expect(both!.to).toBeLessThan(plain!.to);
    const used = bad.filter((_, i) => weights[i]! >= 0.5);
    const rule = maximumBaseline(used, fit, options.tolerances[0]!, {
      ...options,
      wrongFixes: wrongFixGrowth(bad, crowded),
      crowdedDaysKept: crowdedDaysKept(bad, fit, crowded),
    });
    expect(rule.maximumBaselineKm!).toBeLessThanOrEqual(both!.to);
    expect(rule.maximumBaselineKm!).toBeGreaterThan(0.7 * both!.from);
  });
  it('that stand alone on their mark and day are judged all the same', () => {
    const days40 = [...new Set(errors.map(({ day }) => day))].slice(0, 40);
    const some = errors.filter(({ day }) => days40.includes(day));
    const visits = some.map(({ mark, day }) => `${mark} ${day}`);
    const lone = visits.findIndex(
      (visit, i) => visits.indexOf(visit) === i && visits.lastIndexOf(visit) === i,
    );
    const spoilt = some.map((row, i) => (i === lone ? { ...row, east: row.east + 500 } : row));
    const own = suspecting([lone], some.length);
    const fit = fitErrorModel(spoilt, {
      component: 'horizontal',
      reference: 'repeatability',
      weights: own.weights,
    });
    const { specSheetRules } = backTest(spoilt, fit, {
      screening: own,
      tolerances: [tolerance(200)],
      specSheet: spec,
    });
    expect(specSheetRules[0]!.failures.filter(({ suspected }) => suspected)).toHaveLength(1);
  });
});

describe('forward in time', () => {
  const { rows } = simulateErrors({ seed: 8, days: 40, occupationsPerDay: { from: 20, to: 30 } });
  const model = fitErrorModel(rows, { component: 'horizontal' });
  it('judges the later half by the first', () => {
    const found = forwardTest(rows, model, { tolerances: [tolerance(25)] });
    expect(found).toMatchObject({ daysFitted: 20, reason: null, onNewMarks: 0 });
    expect(found.fittedTo! < found.judgedFrom!).toBe(true);
    expect(found.own!.observedShare).toBeGreaterThan(0.88);
    expect(found.rules[0]!.shots).toBeGreaterThan(100);
    const worse = rows.map((row) =>
      row.day > found.fittedTo! ? { ...row, east: 3 * row.east, north: 3 * row.north } : row,
    );
    expect(forwardTest(worse, model).own!.high!).toBeLessThan(0.8);
  });
  it('needs 20 days', () => {
    const few = rows.filter(({ day }) => day < model.uncertainty!.terms.days[19]!);
    expect(forwardTest(few, fitErrorModel(few, { component: 'horizontal' })).reason).toBe(
      '19 days are too few to fit the first and judge the later ones: that needs 20',
    );
  });
});

it('a crew with larger errors does not fit the model of the others', () => {
  const { rows } = simulateErrors({ seed: 5, days: 25 });
  const worse = rows.map((row) => (row.crew === 'B' ? { ...row, up: 2 * row.up } : row));
  const model = fitErrorModel(worse, { component: 'vertical' });
  const groups = leaveGroupOut(worse, model, { by: 'crew' });
  expect(groups.map(({ group }) => group)).toEqual(['A', 'B', 'C']);
  expect(groups[1]!.score!.high!).toBeLessThan(0.9);
  for (const k of [0, 2]) expect(groups[k]!.score!.observedShare).toBeGreaterThan(groups[1]!.score!.high!);
  expect(leaveGroupOut(rows, model, { by: 'base' })).toMatchObject([
    { score: null, reason: 'there is no other base' },
  ]);
});
