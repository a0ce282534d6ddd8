import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type DegradedDay, rankAssociation, thresholdRule } from '../../src/days/association.js';
import { normalDeviates, type Random, randomStream } from '../../src/stats/index.js';

interface Reference {
  readonly x: readonly number[];
  readonly y: readonly number[];
  readonly spearman: number;
  readonly exact: readonly { order: readonly number[]; spearman: number; pValue: number }[];
  readonly shares: readonly { count: number; of: number; low: number; high: number }[];
}
const path = fileURLToPath(new URL('../fixtures/association/association.json', import.meta.url));
const R = JSON.parse(readFileSync(path, 'utf8')) as Reference;
const random = (): Random => randomStream(3, 'association');

/** A series in which each day resembles the one before. */
function persistent(n: number, carried: number, draw: () => number): number[] {
  const values: number[] = [];
  let value = draw();
  for (let i = 0; i < n; i++) {
    value = carried * value + Math.sqrt(1 - carried ** 2) * draw();
    values.push(value);
  }
  return values;
}

describe('rankAssociation', () => {
  it("has R's rank correlation, ties and all", () => {
    const found = rankAssociation(R.x, R.y, { random: random() });
    expect(found.spearman).toBeCloseTo(R.spearman, 11);
    expect(found.low!).toBeLessThan(R.spearman);
    expect(found.high!).toBeGreaterThan(R.spearman);
  });

  it('has the interval of Bonett & Wright for independent days', () => {
    // 40 days without memory: z ± 1.96 √((1 + r²/2)/(n - 3))
    const draw = normalDeviates(randomStream(8));
    const [x, noise] = [persistent(40, 0, draw), persistent(40, 0, draw)];
    const { spearman, low, high } = rankAssociation(
      x,
      x.map((value, i) => value + noise[i]!),
      {
        random: random(),
      },
    );
    const half = 1.959963984540054 * Math.sqrt((1 + spearman! ** 2 / 2) / 37);
    expect(low).toBeCloseTo(Math.tanh(Math.atanh(spearman!) - half), 10);
    expect(high).toBeCloseTo(Math.tanh(Math.atanh(spearman!) + half), 10);
  });

  it('of ten days in full agreement is as rare as chance orders can show', () => {
    const ten = [1, 2, 3, 4, 5, 6, 7, 8, 9, 10];
    // of the 3 628 800 orders two lie as far out
    expect(rankAssociation(ten, ten, { random: random(), blockDays: 1 }).pValue).toBe(1 / 10_000);
  });

  it.each(R.exact)("with blocks of one day has R's p-value $pValue", ({ order, spearman, pValue }) => {
    const ten = [1, 2, 3, 4, 5, 6, 7, 8, 9, 10];
    const found = rankAssociation(ten, order, { random: random(), blockDays: 1 });
    expect(found.spearman).toBeCloseTo(spearman, 11);
    // four standard errors of 9999 drawn orders
    const margin = 4 * Math.sqrt((pValue * (1 - pValue)) / 9999) + 1e-4;
    expect(Math.abs(found.pValue! - pValue)).toBeLessThan(margin);
  });

  it('is the same whichever way the values are stretched, and turns its sign with one of them', () => {
    const values = fc.array(fc.integer({ min: -50, max: 50 }), { minLength: 12, maxLength: 25 });
    fc.assert(
      fc.property(values, fc.integer(), (x, seed) => {
        const y = x.map((_, i) => ((i * 7919 + seed) % 31) + i / 100);
        const options = () => ({ random: random(), permutations: 99 });
        const found = rankAssociation(x, y, options());
        const stretched = rankAssociation(
          x.map((v) => v ** 3 / 7 + 2),
          y,
          options(),
        );
        expect(stretched).toEqual(found);
        const turned = rankAssociation(
          x.map((v) => -v),
          y,
          options(),
        );
        if (found.spearman !== null) {
          expect(turned.spearman).toBeCloseTo(-found.spearman, 12);
          expect(Math.abs(found.spearman)).toBeLessThanOrEqual(1);
          expect(turned.pValue).toBe(found.pValue);
        }
      }),
      { seed: 31, numRuns: 50 },
    );
  });

  it('does not take the likeness of neighbouring days for an association', () => {
    const draw = normalDeviates(randomStream(12));
    const [campaigns, level] = [200, 0.05];
    const rejected = { byDay: 0, byBlock: 0 };
    for (let k = 0; k < campaigns; k++) {
      const [x, y] = [persistent(60, 0.8, draw), persistent(60, 0.8, draw)];
      const options = { random: randomStream(k), permutations: 199 };
      if (rankAssociation(x, y, { ...options, blockDays: 1 }).pValue! <= level) rejected.byDay += 1;
      if (rankAssociation(x, y, options).pValue! <= level) rejected.byBlock += 1;
    }
    // a test of independent days errs several times too often here
    expect(rejected.byDay / campaigns).toBeGreaterThan(0.2);
    expect(rejected.byBlock / campaigns).toBeLessThan(0.13);
  });

  it('leaves out days that are not known in both, and counts them', () => {
    const x = [...R.x, Number.NaN, 2];
    const y = [...R.y, 1, Number.NaN];
    const whole = rankAssociation(R.x, R.y, { random: random() });
    expect(rankAssociation(x, y, { random: random() })).toEqual({ ...whole, leftOut: 2 });
  });

  it.each([
    ['no days', [], [], 'Nothing can be said from these days: 0 of them are known in both.'],
    [
      'one quantity that does not vary',
      [1, 2, 3, 4],
      [5, 5, 5, 5],
      'Nothing can be said from these days: one of the two is the same on all of them.',
    ],
  ])('of %s says so', (_, x, y, statement) => {
    const found = rankAssociation(x, y, { random: random() });
    expect(found).toMatchObject({ spearman: null, low: null, high: null, pValue: null, statement });
  });

  it('of few days gives the number and no verdict', () => {
    const found = rankAssociation([1, 2, 3, 4, 5, 6], [1, 3, 2, 5, 6, 4], { random: random() });
    expect(found.pValue).toBeNull();
    expect(found.statement).toMatch(
      /^Too few days to tell an association from chance: 6 are known in both, 10 are needed/,
    );
  });

  it('speaks of going together, never of a cause, and of what it cannot tell', () => {
    const together = rankAssociation(R.x, R.y, { random: random(), blockDays: 1 });
    expect(together.statement).toMatch(
      /^Over 15 days the two went together: where one ranked higher, the other tended to rank higher \(Spearman 0\.71, 95 % limits 0\.\d\d to 0\.\d\d; a chance order of the days gives as much in [\d.]+ % of cases\)\. That they go together names no cause:/,
    );
    const draw = normalDeviates(randomStream(77));
    const apart = rankAssociation(persistent(30, 0, draw), persistent(30, 0, draw), { random: random() });
    expect(apart.statement).toMatch(/^Over 30 days no association can be told from chance/);
    expect(apart.statement).toContain('This does not show that there is none');
  });

  it('draws from its random argument alone', () => {
    const draw = normalDeviates(randomStream(5));
    const [x, y] = [persistent(30, 0.3, draw), persistent(30, 0.3, draw)];
    const p = (seed: number) =>
      rankAssociation(x, y, { random: randomStream(seed), permutations: 999 }).pValue;
    expect(p(1)).toBe(p(1));
    expect(p(1)).not.toBe(p(2));
  });

  it('refuses impossible options', () => {
    expect(() => rankAssociation([1], [1, 2], { random: random() })).toThrow(RangeError);
    for (const options of [{ blockDays: 0 }, { blockDays: 1.5 }, { permutations: 10 }, { confidence: 95 }])
      expect(() => rankAssociation([1], [1], { random: random(), ...options })).toThrow(RangeError);
  });
});

describe('thresholdRule', () => {
  const day = (kpMax: number, degraded: boolean): DegradedDay => ({ kpMax, degraded });
  /** `count` days alike, so that exact shares can be asked for. */
  const days = (kpMax: number, degraded: boolean, count: number): DegradedDay[] =>
    Array.from({ length: count }, () => day(kpMax, degraded));

  it('gives shares by hand, threshold by threshold', () => {
    const list = [day(2, false), day(3, false), day(5, true), day(3, true), day(6, true), day(5, false)];
    const { thresholds, degradedDays, best } = thresholdRule(list, { random: random() });
    expect(degradedDays).toBe(3);
    expect(
      thresholds.map(({ kpFrom, flaggedDays, caught, falseAlarms }) => [
        kpFrom,
        flaggedDays,
        `${caught.count}/${caught.of}`,
        `${falseAlarms.count}/${falseAlarms.of}`,
      ]),
    ).toEqual([
      [3, 5, '3/3', '2/3'],
      [5, 3, '2/3', '1/3'],
      [6, 1, '1/3', '0/3'],
    ]);
    expect(thresholds.map(({ youden }) => youden!.toFixed(3))).toEqual(['0.333', '0.333', '0.333']);
    expect(best!.kpFrom).toBe(6);
  });

  it.each(R.shares)("has R's exact interval of $count in $of", ({ count, of, low, high }) => {
    const list = [
      ...days(5, true, count),
      ...days(3, true, of - count),
      ...days(2, false, 4),
      ...days(5, false, 1),
    ];
    const { thresholds } = thresholdRule(list, { random: random(), permutations: 99 });
    const { caught } = thresholds.find(({ kpFrom }) => kpFrom === 5)!;
    expect(caught).toMatchObject({ count, of });
    expect(caught.low).toBeCloseTo(low, 9);
    expect(caught.high).toBeCloseTo(high, 9);
  });

  it('flags fewer days as the threshold rises, and never catches more', () => {
    const oneDay = fc.record({ kpMax: fc.integer({ min: 0, max: 9 }), degraded: fc.boolean() });
    fc.assert(
      fc.property(fc.array(oneDay, { maxLength: 40 }), (list) => {
        const { thresholds, days: n } = thresholdRule(list, { random: random(), permutations: 99 });
        expect(n).toBe(list.length);
        thresholds.forEach((row, i) => {
          const next = thresholds[i + 1];
          expect(row.caught.of + row.falseAlarms.of).toBe(n);
          if (next === undefined) return;
          expect(next.flaggedDays).toBeLessThan(row.flaggedDays);
          expect(next.caught.count).toBeLessThanOrEqual(row.caught.count);
        });
      }),
      { seed: 33, numRuns: 60 },
    );
  });

  it('finds a threshold that helps', () => {
    const draw = randomStream(9);
    const list = Array.from({ length: 60 }, () => {
      const kpMax = Math.round(draw() * 21) / 3;
      return day(kpMax, kpMax > 5 ? draw() < 0.9 : draw() < 0.05);
    });
    const { pValue, best, chanceYouden, statement } = thresholdRule(list, { random: random() });
    expect(pValue!).toBeLessThan(0.001);
    expect(best!.kpFrom).toBeGreaterThan(4.9);
    expect(best!.youden!).toBeGreaterThan(chanceYouden!);
    expect(statement).toMatch(
      /^The best threshold, Kp [\d.]+, catches \d+ of \d+ degraded days and flags \d+ of \d+ others;/,
    );
    expect(statement).toContain('names no cause');
  });

  it('says when none helps, and allows for the search for the best', () => {
    const campaigns = 150;
    let helped = 0;
    for (let k = 0; k < campaigns; k++) {
      const draw = randomStream(k, 'days');
      const list = Array.from({ length: 40 }, () => day(Math.round(draw() * 18) / 3, draw() < 0.2));
      const { pValue } = thresholdRule(list, { random: randomStream(k), permutations: 199 });
      if (pValue !== null && pValue <= 0.05) helped += 1;
    }
    // 5 % and three standard errors
    expect(helped / campaigns).toBeLessThan(0.105);
    const none = thresholdRule(
      Array.from({ length: 40 }, (_, i) => day((i * 7) % 11, i % 5 === 0)),
      { random: random() },
    );
    expect(none.statement).toMatch(
      /^No threshold of Kp helps to tell degraded days here\. The best threshold, Kp/,
    );
    expect(none.statement).toMatch(/Rest no rule on Kp\.$/);
  });

  it.each<[string, DegradedDay[], string]>([
    ['no days', [], 'Kp is known for none of them'],
    ['days without Kp', days(Number.NaN, true, 3), 'Kp is known for none of them'],
    ['no degraded day', [day(1, false), day(2, false)], 'none of them was degraded'],
    ['degraded days alone', [day(1, true), day(2, true)], 'all of them were degraded'],
    ['one Kp', [day(3, true), day(3, false)], 'the greatest Kp is the same on all of them'],
  ])('of %s judges nothing', (_, list, why) => {
    expect(thresholdRule(list, { random: random() })).toMatchObject({
      best: null,
      pValue: null,
      statement: `No threshold of Kp can be judged from these days: ${why}.`,
    });
  });

  it('of too few degraded days gives shares and no verdict', () => {
    const list = [...days(5, true, 2), ...days(2, false, 30)];
    const found = thresholdRule(list, { random: random() });
    expect(found.pValue).toBeNull();
    expect(found.statement).toContain(
      'too few days to tell it from chance: 2 degraded of 32, where 3 are needed',
    );
  });
});
