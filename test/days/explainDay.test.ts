import { describe, expect, it } from 'vitest';
import { type SimulatedOccupation, simulateErrors } from '../../src/campaign/index.js';
import { type DayExplanation, dayModel, explainDay, judgeDegradedDays } from '../../src/days/index.js';
import type { Visit } from '../../src/errors/index.js';
import { fitErrorModel } from '../../src/fit/index.js';
import { expectSentences } from './reference.js';

/*
 * Faults of known kind put into one day of a simulated campaign whose days are alike otherwise: the verdict must name
 * the fault, and the day must stay in the fit.
 */

type Row = SimulatedOccupation & { ageSeconds: number; satellites: number; pdop: number };

const plain: readonly Row[] = simulateErrors({ seed: 77, days: 30, dayFactorLogSd: 0.15 }).rows.map(
  (row, i) => ({
    ...row,
    ageSeconds: 1 + 0.1 * (i % 5),
    satellites: 14 + (i % 3),
    pdop: 1.4 + 0.1 * (i % 4),
  }),
);
const days = [...new Set(plain.map(({ day }) => day))];
const DAY = days[10]!;
const onDay = plain.filter(({ day }) => day === DAY);
const farMark = onDay.reduce((far, row) => (row.baselineKm > far.baselineKm ? row : far)).mark;

function judged(change: (row: Row) => Partial<Row>, visits?: readonly Visit[]): DayExplanation {
  const rows = plain.map((row) => (row.day === DAY ? { ...row, ...change(row) } : row));
  const days = dayModel(rows, fitErrorModel(rows, { component: 'horizontal' }));
  const found = explainDay(DAY, rows, days, { visits });
  expectSentences([found.note]);
  return found;
}

const larger = (row: Row, factor: number): Partial<Row> => ({
  east: factor * row.east,
  north: factor * row.north,
});
/** Enlarges what grows with distance, as the simulation makes it: near shots are as on other days. */
const worsePpm = (row: Row): Partial<Row> =>
  larger(row, Math.hypot(8, 4 * row.baselineKm) / Math.hypot(8, row.baselineKm));

describe('a day judged', () => {
  it('whose ppm is four times as large: grows with distance', () => {
    const { verdict, factor, note, growthEvidence, conditions } = judged(worsePpm);
    expect(verdict).toBe('grows with distance');
    expect(factor).toBeGreaterThan(2);
    expect(growthEvidence).toBeGreaterThan(3.2);
    expect(conditions.filter(({ unusual }) => unusual)).toEqual([]);
    expect(note.text).toMatch(
      /^On 2025-\d\d-\d\d the horizontal ppm was \d\.\d times .* The day stays in the fit\.$/,
    );
  });

  it('with an offset of the base: bad setup, with its size', () => {
    const found = judged((row) => ({
      setup: `B1 ${DAY}`,
      east: row.east + 60,
      north: row.north - 45,
    }));
    expect(found.verdict).toBe('bad setup');
    expect(found.subject).toBe(`B1 ${DAY}`);
    expect(found.setups[0]!.offsetMm).toBeGreaterThan(60);
    expect(found.setups[0]!.offsetMm).toBeLessThan(90);
    expect(found.note.text).toMatch(/a bad setup, B1 2025-\d\d-\d\d, all of whose shots are off by \d+ mm/);
  });

  it('with one mark far off: one mark', () => {
    const found = judged((row) => (row.mark === farMark ? { east: row.east + 250 } : {}));
    expect(found.verdict).toBe('one mark');
    expect(found.subject).toBe(farMark);
    expect(found.note.text).toMatch(/one mark, .* shots; the others are .* times as probable/);
  });

  it('with one crew far off: one crew, or its receiver', () => {
    const crew = onDay[0]!.crew;
    const found = judged((row) => (row.crew === crew ? larger(row, 5) : {}));
    expect(found.verdict).toBe('one crew');
    expect(found.subject).toBe(crew);
    expect(found.receiver!.name).toBe(onDay[0]!.rover);
    expect(found.note.text).toContain('which cannot be told apart that day');
  });

  it('with one receiver far off while crews swap: one receiver', () => {
    // Crews share the receivers all day long, so that no crew alone is guilty.
    const rovers = ['R1', 'R2', 'R3'];
    const swapped = onDay.map((row, i) => ({ ...row, rover: rovers[Math.floor(i / 3) % 3]! }));
    const roverOf = new Map(onDay.map((row, i) => [row, swapped[i]!.rover]));
    const found = judged((row) => ({
      rover: roverOf.get(row)!,
      ...(roverOf.get(row) === 'R2' ? larger(row, 6) : {}),
    }));
    expect(found.verdict).toBe('one receiver');
    expect(found.subject).toBe('R2');
  });

  it('with errors larger at all distances alike: not explained', () => {
    const { verdict, growthEvidence } = judged((row) => larger(row, 3));
    expect(growthEvidence).toBeLessThan(1);
    expect(verdict).toBe('not explained');
  });

  it('names circumstances out of the ordinary', () => {
    const { conditions, note } = judged((row) => ({ ...worsePpm(row), ageSeconds: 9, satellites: 8 }));
    expect(conditions.filter(({ unusual }) => unusual).map(({ name }) => name)).toEqual([
      'satellites',
      'age of corrections, s',
    ]);
    expect(note.text).toContain('age of corrections, s 9.0 (usual 1.2)');
  });

  it('names missing fixes when visits are known', () => {
    const visits = plain.map(
      (row, i): Visit => ({
        ...row,
        endMs: row.startMs,
        rows: 5,
        fixedRows: row.day === DAY && i % 2 === 0 ? 0 : 5,
      }),
    );
    const { conditions } = judged(worsePpm, visits);
    const missing = conditions.find(({ name }) => name === 'share of visits without a fix')!;
    expect(missing.unusual).toBe(true);
    expect(missing.value).toBeCloseTo(0.5, 1);
    expect(missing.usual).toBe(0);
  });
});

describe('judgeDegradedDays', () => {
  const rows = plain.map((row) => (row.day === DAY ? { ...row, ...worsePpm(row) } : row));
  const model = dayModel(rows, fitErrorModel(rows, { component: 'horizontal' }));

  it('judges exactly the degraded days, and drops none', () => {
    expect(model.degradedDays).toEqual([DAY]);
    const judgedDays = judgeDegradedDays(rows, model);
    expect(judgedDays.map(({ day }) => day)).toEqual([DAY]);
    expect(model.dayEstimates.map(({ day }) => day)).toEqual(days);
  });

  it('does not need columns that a log may lack', () => {
    const bare = rows.map(({ day, baselineKm, east, north, startMs }) => ({
      day,
      baselineKm,
      east,
      north,
      startMs,
    }));
    const [found] = judgeDegradedDays(bare, dayModel(bare, fitErrorModel(bare, { component: 'horizontal' })));
    expect(found!.verdict).toBe('grows with distance');
    expect([found!.setups, found!.conditions, found!.mark, found!.crew]).toEqual([[], [], null, null]);
  });

  it('refuses errors that are not those of the model', () => {
    expect(() => judgeDegradedDays(rows.slice(1), model)).toThrow(/errors of the day model/);
  });

  it('refuses a day that is not in the data', () => {
    expect(() => explainDay('1999-01-01', rows, model)).toThrow(RangeError);
  });

  it('calls ordinary days unusual seldom: at most 3 of 29 have a setup or circumstance out of the ordinary', () => {
    const ordinary = days.filter((day) => day !== DAY).map((day) => explainDay(day, rows, model));
    const alarms = ordinary.filter(
      ({ setups, conditions }) =>
        conditions.some(({ unusual }) => unusual) || setups.some(({ adjustedP }) => adjustedP < 0.05),
    );
    expect(alarms.length).toBeLessThanOrEqual(3);
  });
});
