import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { simulateErrors } from '../../src/campaign/index.js';
import { compareStudies, fitByGroup, fitErrorModel } from '../../src/fit/index.js';
import { randomStream, shuffle } from '../../src/stats/index.js';

const { rows } = simulateErrors({ seed: 21, days: 24 });
const random = () => randomStream(4, 'flips');
const byCrew = (errors: readonly object[], more: object = {}) =>
  fitByGroup(errors, { by: 'crew', component: 'vertical', random: random(), flips: 299, ...more });

describe('fits by group', () => {
  it('are those of the group alone, against the published coordinates', () => {
    const { groups } = byCrew(rows);
    expect(groups.map(({ group }) => group)).toEqual(['A', 'B', 'C']);
    for (const { group, constantMm, ppm, reason, occupations } of groups) {
      const own = rows.filter(({ crew }) => crew === group);
      const alone = fitErrorModel(own, { component: 'vertical' });
      expect(occupations).toBe(own.length);
      expect(constantMm).toEqual(alone.constantMm);
      expect(ppm).toEqual(alone.ppm);
      expect(reason).toBeNull();
    }
  });
  it('call equal crews not shown to differ, and name a crew that is worse', () => {
    const equal = byCrew(rows);
    expect(equal.verdict).toBe('not shown to differ');
    expect(equal.message.text).toMatch(
      /^The 3 crews are not shown to differ \(p = 0\.\d{3}\); that is no proof/,
    );
    const worse = byCrew(rows.map((row) => (row.crew === 'B' ? { ...row, up: 2 * row.up } : row)));
    expect(worse.verdict).toBe('differ');
    expect(worse.message.text).toMatch(/^The 3 crews differ in constant or ppm .* to \d+\.\d \(B\) mm/);
  });
  // The level is measured over 400 studies a design in test/bench/groups.ts: .03 to .05 at .05.
  it('keep their level, also where each crew has days of its own', () => {
    let told = 0;
    for (let seed = 1; seed <= 40; seed++) {
      const campaign = simulateErrors({ seed, days: 16, occupationsPerDay: { from: 12, to: 18 } }).rows;
      const days = [...new Set(campaign.map(({ day }) => day))];
      const errors = campaign.map((row) => ({ ...row, crew: days.indexOf(row.day) < 8 ? 'A' : 'B' }));
      told += Number(byCrew(errors, { flips: 99 }).verdict === 'differ');
    }
    // More than 6 of 40 at the level .05 would be chance of about 1 in 100.
    expect(told).toBeLessThanOrEqual(6);
  });
  it('keep the offset of a crew that is always off, where marks are taken out', () => {
    const off = rows.map((row) => (row.crew === 'C' ? { ...row, up: row.up + 40 } : row));
    const { groups, verdict } = byCrew(off, { reference: 'repeatability' });
    expect(verdict).toBe('differ');
    const [a, , c] = groups;
    expect(c!.constantMm.estimate!).toBeGreaterThan(1.4 * a!.constantMm.estimate!);
  });
  it('do not depend on the order of rows', () => {
    const first = byCrew(rows);
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 1e6 }), (seed) => {
        expect(byCrew(shuffle(rows, randomStream(seed)))).toEqual(first);
      }),
      { seed: 6, numRuns: 5 },
    );
  });
  it('leave small groups out of the test and say so, and give a reason for what is missing', () => {
    const [day] = rows.map((row) => row.day);
    const few = rows.map((row) => (row.day === day && row.crew === 'A' ? { ...row, crew: 'new' } : row));
    const { groups, message } = byCrew(few);
    const small = groups.find(({ group }) => group === 'new')!;
    expect(small.tested).toBe(false);
    expect(small.reason).toMatch(/too few for an uncertainty/);
    expect(message.text).toContain('1 of 4 have too few days or occupations');
  });
  it('do not compare what cannot be compared', () => {
    const short = rows.filter(({ day }) => day < '2025-03-07');
    const { verdict, pValue, message } = byCrew(short);
    expect([verdict, pValue]).toEqual(['too few days to tell', null]);
    expect(message.text).toContain('cannot be told');
    expect(() => byCrew(rows, { by: 'hat' })).toThrow(
      'Expected "crew", "rover", "base" or "setup" as by, came "hat"',
    );
    expect(() => byCrew(rows.map(({ crew: _, ...row }) => row))).toThrow(
      'Expected a column "crew" in the errors',
    );
  });
});

describe('two studies', () => {
  const other = (seed: number, factor: number) =>
    simulateErrors({ seed, days: 24 }).rows.map((row) => ({ ...row, up: factor * row.up }));
  const compare = (after: readonly object[]) =>
    compareStudies(rows, after, { component: 'vertical', random: random(), flips: 299 });
  it('that are alike are not shown to differ', () => {
    const { verdict, constantRatio, ppmRatio, message } = compare(other(22, 1));
    expect(verdict).toBe('not shown to differ');
    for (const { low, high } of [constantRatio, ppmRatio]) {
      expect(low!).toBeLessThan(1);
      expect(high!).toBeGreaterThan(1);
    }
    expect(message.text).toMatch(
      /^Before and after are not shown to differ \(p = .*no proof that nothing changed\.$/,
    );
  });
  it('that differ are told, with both ratios', () => {
    const same = compare(rows.map((row) => ({ ...row, up: 2 * row.up })));
    expect(same.constantRatio.estimate!).toBeCloseTo(2, 9);
    expect(same.ppmRatio.estimate!).toBeCloseTo(2, 9);
    expect(same.verdict).toBe('differ');
    expect(same.message.text).toContain('after over before: constant 2.00');
  });
  it('with few days are not compared', () => {
    const { verdict, message } = compare(rows.filter(({ day }) => day < '2025-03-06'));
    expect(verdict).toBe('too few days to tell');
    expect(message.text).toContain('Both need at least 5 days.');
  });
});
