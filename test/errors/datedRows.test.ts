import { describe, expect, it } from 'vitest';
import { computeErrors, type FormOccupationsOptions, formOccupations } from '../../src/errors/index.js';
import type { Position } from '../../src/logs/index.js';
import { at, BASES, batches, control, MARKS } from './world.js';

/* Rows with a date and no time of day, as point lists have them: each is a shot of its own, only its hour is lost. */

const known = control();
let row = 2;

/** A row of 2025-03-04 that is `northMm` off CP1 (a degree of latitude at 47° is 111 178 m, from memory). */
const dated = (northMm: number, change: Partial<Position> = {}): Position =>
  at(0, {
    utcMs: Number.NaN,
    dateOnly: '2025-03-04',
    row: row++,
    ...MARKS.CP1!,
    latitudeDeg: MARKS.CP1!.latitudeDeg + northMm / 1000 / 111_178,
    ...change,
  });

const form = (positions: readonly Position[], options: FormOccupationsOptions = {}, where = known) =>
  formOccupations(batches(positions), where, options);

describe('rows without a time of day', () => {
  it('are occupations of their own, several a day, without times and hours', async () => {
    const { occupations, visits, files } = await form([dated(3), dated(-5), dated(8, { epochs: 12 })]);
    expect(occupations).toHaveLength(3);
    expect(visits).toHaveLength(3);
    for (const { startMs, endMs, day, setup } of occupations) {
      expect([startMs, endMs, day, setup]).toEqual([Number.NaN, Number.NaN, '2025-03-04', 'B1']);
    }
    expect(occupations.map(({ epochs }) => epochs).sort()).toEqual([1, 1, 12]);
    expect(files[0]).toMatchObject({ read: 3, used: 3, setAside: {} });
    const { errors } = computeErrors(occupations, known);
    expect(errors.map(({ north }) => Math.round(north)).sort((a, b) => a - b)).toEqual([-5, 3, 8]);
    expect(errors.map(({ solarHour }) => solarHour)).toEqual([Number.NaN, Number.NaN, Number.NaN]);
  });

  it('that come exactly again are duplicates, on the same day alone', async () => {
    const first = dated(3);
    const again = { ...first, row: 90 };
    const nextDay = { ...first, row: 91, dateOnly: '2025-03-05' };
    const { occupations, files } = await form([first, dated(-5), again, nextDay]);
    expect(occupations.map(({ day, row: place }) => [day, place])).toEqual(
      expect.arrayContaining([
        ['2025-03-04', first.row],
        ['2025-03-05', 91],
      ]),
    );
    expect(occupations).toHaveLength(3);
    expect(files[0]!.setAside).toEqual({ duplicate: { count: 1, firstRows: [90] } });
  });

  it('of other rovers, or beside rows with a time, are other shots', async () => {
    const first = dated(3);
    const timed = { ...first, utcMs: Date.UTC(2025, 2, 4, 9), dateOnly: '' };
    const { occupations } = await form([first, { ...first, rover: 'R2' }, timed]);
    expect(occupations).toHaveLength(3);
  });

  it('are never moving and never in conflict, however far apart', async () => {
    const { files } = await form([dated(0), dated(900), dated(1800), dated(2700)]);
    expect(files[0]).toMatchObject({ used: 4, setAside: {} });
  });

  it('without a fix are visits without a fix, one a row', async () => {
    const { visits, occupations, files } = await form([
      dated(3, { fix: 'float' }),
      dated(3, { fix: 'float' }),
    ]);
    expect([visits.length, occupations.length]).toEqual([2, 0]);
    expect(visits.map(({ fixedRows }) => fixedRows)).toEqual([0, 0]);
    expect(files[0]!.setAside['not-fixed']?.count).toBe(2);
  });

  it('belong to the period by their date, whatever zone the study has', async () => {
    const days = ['2025-03-03', '2025-03-04', '2025-03-05', '2025-03-06'];
    const rows = days.map((dateOnly, k) => dated(k, { dateOnly }));
    for (const timeZone of [null, 'Pacific/Kiritimati', 'America/Los_Angeles']) {
      const { occupations, files } = await form(rows, {
        timeZone,
        period: { from: '2025-03-04', to: '2025-03-05' },
      });
      expect(occupations.map(({ day }) => day)).toEqual(['2025-03-04', '2025-03-05']);
      expect(files[0]!.setAside['outside-study']?.count).toBe(2);
    }
  });

  it('have a setup a day from a tripod', async () => {
    const tripod = control(MARKS, { B1: BASES.B1! }, 'tripod');
    const { occupations } = await form([dated(1), dated(2, { dateOnly: '2025-03-05' })], {}, tripod);
    expect(occupations.map(({ setup }) => setup)).toEqual(['B1 2025-03-04', 'B1 2025-03-05']);
  });

  it('are not cut into windows', async () => {
    const { occupations } = await form([dated(1), dated(2)], { windowSeconds: 60 });
    expect(occupations).toHaveLength(2);
  });
});
