import { describe, expect, it } from 'vitest';
import { simulateErrors } from '../../src/campaign/index.js';
import { fitErrorModel } from '../../src/fit/index.js';
import { maximumBaseline, promiser, reachPoints } from '../../src/rule/index.js';
import { tolerance } from './reference.js';

const { rows } = simulateErrors({ seed: 12, days: 30 });
const model = fitErrorModel(rows, { component: 'horizontal' });
const rule = maximumBaseline(rows, model, tolerance(25));
const promise = promiser(rows, model);
// One degree of latitude is 111 km: 0.05° about 5.6 km.
const place = (name: string, latitudeDeg: number, heightM = 100) => ({
  name,
  position: { latitudeDeg, longitudeDeg: -18.4, heightM },
});
const bases = [place('B1', 44.3), place('B2', 44.5)];

describe('points of a job', () => {
  const plan = reachPoints(
    [place('P1', 44.32, 160), place('P2', 44.4, Number.NaN), place('P3', 44.47), place('P4', 45.2)],
    bases,
    { rule, promise },
  );
  it('are reached from bases within the rule, the nearest first', () => {
    const reached = plan.points.map(({ reachedFrom }) => reachedFrom);
    expect(reached[0]).toEqual(['B1']);
    expect(reached[2]![0]).toBe('B2');
    expect(plan.points[3]).toMatchObject({ reachedFrom: [], needsAnotherBase: true });
    for (const { holds, baselineKm } of plan.reaches)
      expect(holds).toBe(baselineKm <= rule.maximumBaselineKm!);
    expect(plan.sentence).toMatch(
      /points? lies? beyond the maximum baseline of every base: .*"P4"\. Put a base nearer/,
    );
  });
  it('need no other base where there is no rule', () => {
    const none = { rule: { ...rule, maximumBaselineKm: null, reason: 'too few days' }, promise };
    const { points, reaches, sentence } = reachPoints([place('P1', 44.32)], bases, none);
    expect(points[0]).toMatchObject({ reachedFrom: [], needsAnotherBase: null });
    expect(reaches.map(({ holds }) => holds)).toEqual([null, null]);
    expect(sentence).toContain('because there is no rule: too few days.');
  });
  it('have what can be promised there, or the reason', () => {
    const [near, far] = ['P1', 'P2'].map((name) => plan.reaches.find(({ point }) => point === name));
    expect(near!.promisedMm!).toBeLessThan(far!.promisedMm!);
    expect(near!.promisedMm!).toBeLessThan(25);
    const beyond = plan.reaches.find(({ point, base }) => point === 'P4' && base === 'B1')!;
    expect(beyond.promisedMm).toBeNull();
    expect(beyond.reason).toContain('nothing can be promised at 100.');
  });
  it('know their height difference, and bases that the rule was not found from', () => {
    const [first] = plan.reaches;
    expect(Math.abs(first!.heightDifferenceM! - 60)).toBeLessThan(1);
    expect(plan.reaches.find(({ point }) => point === 'P2')!.heightDifferenceM).toBeNull();
    expect(plan.bases.map(({ base, baseOfRule }) => (base === 'B1') === baseOfRule)).not.toContain(false);
  });
  it('are reached less far from a base that is known worse', () => {
    const worse = maximumBaseline(rows, model, tolerance(25), { baseSigmaMm: 6 });
    const weak = { rule: worse, promise: promiser(rows, model, { baseSigmaMm: 6 }) };
    const between = [place('M', 44.4)];
    const own = reachPoints(between, bases, { rule, promise }, (base) =>
      base === 'B1' ? weak : { rule, promise },
    );
    // Both are as far from it, so the better known one is the one to use.
    expect(own.points[0]!.bestBase).toBe('B2');
    const [b1, b2] = own.bases;
    expect(b1!.maximumBaselineKm!).toBeLessThan(b2!.maximumBaselineKm!);
    expect(own.maximumBaselineKm).toBe(rule.maximumBaselineKm);
  });
  it('are refused without a place, and told without a rule', () => {
    expect(() => reachPoints([], bases, { rule, promise })).toThrow(
      'Expected at least one point of a job, came none.',
    );
    expect(() => reachPoints([bases[0]!, bases[0]!], bases, { rule, promise })).toThrow('came "B1" twice');
    expect(() => reachPoints([place('X', Number.NaN)], bases, { rule, promise })).toThrow(
      'Expected a plan position of point "X"',
    );
    const none = { ...rule, maximumBaselineKm: null, reason: '3 days are too few: a rule needs 15 days' };
    expect(reachPoints([place('P', 44.3)], bases, { rule: none, promise }).sentence).toBe(
      'No point can be promised 25 mm, because there is no rule: 3 days are too few: a rule needs 15 days.',
    );
  });
});
