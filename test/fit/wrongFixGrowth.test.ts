import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { type Screening, screenWrongFixes, wrongFixGrowth, wrongFixShareAtKm } from '../../src/fit/index.js';
import { randomStream, shuffle } from '../../src/stats/index.js';
import { referenceErrors, referenceFits } from './reference.js';

const rows = referenceErrors('ref4_marks');
const reference = referenceFits('ref4_marks');
const { truth } = JSON.parse(
  readFileSync(new URL('../fixtures/fits/ref4_marks.json', import.meta.url), 'utf8'),
);

/** A screening that suspects just these rows. */
function suspecting(suspected: readonly number[], length = rows.length): Screening {
  const responsibilities = new Float64Array(length);
  for (const row of suspected) responsibilities[row] = 1;
  return {
    residuals: 'errors',
    components: ['east', 'north', 'up'],
    weights: responsibilities.map((pi) => 1 - pi),
    responsibilities,
    suspected,
    crowdedDays: [],
    share: { events: 0, estimate: 0, low: 0, high: 0, designEffect: 1 },
    refused: false,
    iterations: 1,
    converged: true,
    notes: [],
  };
}

// Source: R 4.2 on the same grid (fixtures/fits, with recipe); 1e-8 relative, runs exactly.
describe.each(['known', 'em'])('growth of wrong fixes equals R for %s ones', (block) => {
  const expected = reference[block].wrong_fixes;
  const screening =
    block === 'known'
      ? suspecting(truth.wrong_fix_rows_1based.map((row: number) => row - 1))
      : screenWrongFixes(rows);
  const growth = wrongFixGrowth(rows, screening);
  it('in events, runs and the posterior', () => {
    expect(growth.suspected).toBe(expected.wrong);
    expect(growth.occupations).toBe(expected.n);
    expect(growth.events).toBe(expected.events);
    expect(growth.runLengths).toEqual(expected.lengths);
    expect(growth.designEffect).toBe(expected.deff);
    expect(growth.meanLogKm / expected.l0).toBeCloseTo(1, 9);
    expect(growth.meanExponent / expected.gamma_mean).toBeCloseTo(1, 8);
    expected.at_km.forEach((km: number, k: number) => {
      const { mean, q80, q95, q05 } = expected.eps[k];
      const share = wrongFixShareAtKm(growth, km);
      expect(share.mean / mean).toBeCloseTo(1, 8);
      expect(share.high80 / q80).toBeCloseTo(1, 8);
      expect(share.high95 / q95).toBeCloseTo(1, 8);
      expect(share.low5 / q05).toBeCloseTo(1, 8);
    });
  });
});

describe('events', () => {
  const day = rows.filter((row) => row.day === rows[0]!.day);
  const places = [...rows.keys()].filter((k) => rows[k]!.day === day[0]!.day);
  it('are runs within a day and rover, in time order whatever the order of rows', () => {
    const next = rows.findIndex((row) => row.day !== day[0]!.day);
    // Two, a gap, the last of the day, and the first of the next day: runs do not go over midnight.
    const suspected = [places[0]!, places[1]!, places.at(-1)!, next];
    const growth = wrongFixGrowth(rows, suspecting(suspected));
    expect(growth.runLengths).toEqual([2, 1, 1]);
    // (Σ len² + 1)/(Σ len + 1) = (6 + 1)/(4 + 1)
    expect(growth.designEffect).toBeCloseTo(1.4, 12);
    const order = shuffle([...rows.keys()], randomStream(8));
    const moved = wrongFixGrowth(
      order.map((k) => rows[k]!),
      suspecting(suspected.map((row) => order.indexOf(row))),
    );
    expect(moved).toEqual(growth);
    const alternate = rows.map((row, k) => ({ ...row, rover: k % 2 === 0 ? 'R1' : 'R2' }));
    const [a, b] = [places[0]!, places[2]!];
    expect(a % 2).toBe(b % 2);
    expect(wrongFixGrowth(alternate, suspecting([a, b])).runLengths).toEqual([2]);
    expect(wrongFixGrowth(rows, suspecting([a, b])).runLengths).toEqual([1, 1]);
  });
  it('are single ones where times are not known', () => {
    const timeless = rows.map(({ startMs, ...rest }) => rest);
    expect(wrongFixGrowth(timeless, suspecting([places[0]!, places[1]!])).runLengths).toEqual([1, 1]);
  });
});

describe('what is said of few events', () => {
  it('none: at most three in n', () => {
    const growth = wrongFixGrowth(rows, suspecting([]));
    expect(growth.notes[0]).toMatchObject({ code: 'no-wrong-fixes' });
    expect(growth.notes[0]!.text).toContain(
      `No wrong fix was found in ${rows.length} occupations: at most 0.35 %`,
    );
    expect(wrongFixShareAtKm(growth, 2).mean).toBeLessThan(0.005);
  });
  it('fewer than five: the growth is assumed', () => {
    expect(wrongFixGrowth(rows, suspecting([5, 100])).notes.map(({ code }) => code)).toEqual([
      'few-wrong-fixes',
    ]);
    expect(wrongFixGrowth(rows, suspecting([5, 100, 200, 300, 400])).notes).toEqual([]);
  });
  it('a screening of other rows, or a refused one, is refused', () => {
    expect(() => wrongFixGrowth(rows, suspecting([], 3))).toThrow('came one of 3');
    expect(() => wrongFixGrowth(rows, { ...suspecting([]), refused: true })).toThrow('was refused');
  });
});

describe('the share at a length', () => {
  it('grows with distance and holds the truth where many events tell of it', () => {
    const random = randomStream(3);
    const many = Array.from({ length: 30000 }, (_, k) => ({
      day: `d${k % 100}`,
      baselineKm: 0.5 + 14 * random() ** 2,
      startMs: k * 1e6,
    }));
    const truthAt = (km: number): number => 0.002 * km ** 1.2;
    const suspected = [...many.keys()].filter((k) => random() < truthAt(many[k]!.baselineKm));
    const growth = wrongFixGrowth(many, suspecting(suspected, many.length));
    let before = 0;
    for (const km of [1, 3, 6, 12]) {
      const { mean, low5, high95 } = wrongFixShareAtKm(growth, km);
      expect(mean).toBeGreaterThan(before);
      expect(low5).toBeLessThan(truthAt(km) * 1.05);
      expect(high95).toBeGreaterThan(truthAt(km) * 0.95);
      before = mean;
    }
    expect(growth.meanExponent).toBeGreaterThan(1);
    expect(growth.meanExponent).toBeLessThan(1.4);
  });
});
