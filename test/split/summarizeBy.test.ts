import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { errorTable, type OccupationError } from '../../src/errors/index.js';
import {
  type SplitBy,
  STANDARD_SPLITS,
  standardSplits,
  summarizeBy,
  summarizeByTwo,
} from '../../src/split/index.js';

/** An occupation with only what a test needs. */
const shot = (rest: Partial<OccupationError> = {}) =>
  Object.freeze({
    day: '2025-03-03',
    base: 'B1',
    setup: 'B1 1',
    mark: 'M1',
    rover: 'R1',
    crew: 'A',
    startMs: 0,
    endMs: 4000,
    solarHour: 9.5,
    baselineKm: 2,
    azimuthDeg: 10,
    east: 3,
    north: 4,
    up: -6,
    epochs: 5,
    satellites: 14,
    pdop: 1.4,
    ageSeconds: 1,
    tiltDeg: Number.NaN,
    support: '',
    sky: 'open',
    ...rest,
  });

const visit = (rest: object = {}) =>
  Object.freeze({ day: '2025-03-03', mark: 'M1', crew: 'A', fixedRows: 5, startMs: 0, endMs: 1, ...rest });

const groups = (errors: readonly object[], by: SplitBy): string[] =>
  summarizeBy(errors, by).map(({ group }) => group);

describe('summarizeBy', () => {
  it('gives count, days, RMS, bias and quantiles as worked out by hand', () => {
    // east 1 … 10 on five days of two shots each, north 0
    const errors = Array.from({ length: 10 }, (_, i) =>
      shot({ day: `2025-03-0${1 + (i % 5)}`, east: i + 1, north: 0, up: -(i + 1) }),
    );
    const [row] = summarizeBy(errors, 'mark');
    expect(row).toMatchObject({ group: 'M1', occupations: 10, days: 5, baselineKm: 2, tooFew: false });
    expect(row!.horizontalRms!.estimate).toBeCloseTo(Math.sqrt(385 / 10), 12);
    // R: quantile(1:10, c(.68, .95), type = 7) gives 7.12 and 9.55 (definition of Hyndman & Fan 1996)
    for (const share of [row!.horizontal68, row!.vertical68]) expect(share).toBeCloseTo(7.12, 12);
    for (const share of [row!.horizontal95, row!.vertical95]) expect(share).toBeCloseTo(9.55, 12);
    expect([row!.meanEast, row!.meanNorth, row!.meanUp]).toEqual([5.5, 0, -5.5]);
    // day totals of east - 5.5 are -4, -2, 0, 2, 4: √(5/4 × 40) / 10 (Liang & Zeger 1986)
    expect(row!.seEast).toBeCloseTo(Math.sqrt(50) / 10, 12);
    expect(row!.seUp).toBeCloseTo(Math.sqrt(50) / 10, 12);
    expect(row!.seNorth).toBe(0);
  });

  it('says too few below 10 occupations or 3 days, and gives no standard error of a single day', () => {
    const nine = Array.from({ length: 9 }, (_, i) => shot({ day: `2025-03-0${i + 1}` }));
    expect(summarizeBy(nine, 'mark')[0]!.tooFew).toBe(true);
    expect(summarizeBy([...nine, shot()], 'mark')[0]!.tooFew).toBe(false);
    const [oneDay] = summarizeBy(
      Array.from({ length: 30 }, () => shot()),
      'mark',
    );
    expect(oneDay!.tooFew).toBe(true);
    expect(oneDay!.seEast).toBeNaN();
    expect(oneDay!.horizontalRms).toEqual({ estimate: 5, low: null, high: null });
  });

  // By days each cell is one day: 3 days would call all of them too few for ever.
  it('counts occupations alone where cells are single days by their nature', () => {
    const ten = Array.from({ length: 10 }, () => shot());
    const few = Array.from({ length: 9 }, () => shot({ day: '2025-03-04', setup: 'B1 2' }));
    for (const by of ['day', 'setup'])
      expect(summarizeBy([...ten, ...few], by).map(({ tooFew }) => tooFew)).toEqual([false, true]);
    expect(summarizeByTwo([...ten, ...few], 'crew', 'day').map(({ tooFew }) => tooFew)).toEqual([
      false,
      true,
    ]);
    expect(summarizeByTwo(ten, 'crew', 'mark')[0]!.tooFew).toBe(true);
  });

  it('uses occupations for what is known of them', () => {
    const [row] = summarizeBy([shot({ up: Number.NaN }), shot({ east: Number.NaN, up: 2 })], 'mark');
    expect(row).toMatchObject({ occupations: 2, horizontal95: 5, vertical95: 2, meanEast: 3, meanUp: 2 });
    const [none] = summarizeBy([shot({ up: Number.NaN })], 'mark');
    expect(none).toMatchObject({ verticalRms: null, vertical68: null, vertical95: null, meanUp: Number.NaN });
  });

  it('knows months, eight directions from north on, and lengths of occupations', () => {
    expect(groups([shot({ day: '2025-04-01' }), shot(), shot({ day: '2025-03-31' })], 'month')).toEqual([
      '2025-03',
      '2025-04',
    ]);
    const azimuths = [337.5, 22.4, 22.5, 90, 181, 269, 337.4, 200, 359.9, Number.NaN];
    const directions = summarizeBy(
      azimuths.map((azimuthDeg) => shot({ azimuthDeg })),
      'direction',
    );
    expect(directions.map(({ group, occupations }) => [group, occupations])).toEqual([
      ['N', 3],
      ['NE', 1],
      ['E', 1],
      ['S', 2],
      ['W', 1],
      ['NW', 1],
      ['not known', 1],
    ]);
    const byLength = { column: 'occupationSeconds', edges: [0, 4, 60] };
    expect(groups([shot(), shot({ endMs: 3999 }), shot({ endMs: Number.NaN })], byLength)).toEqual([
      '0-4',
      '4-60',
      'not known',
    ]);
    expect(groups([{ ...shot(), month: 'spring' }], 'month')).toEqual(['spring']);
  });

  it('takes lower edges in, leaves upper edges to the next class, and loses nothing', () => {
    const rows = summarizeBy(
      [0, 1, 1.5, 2, 7, Number.NaN].map((pdop) => shot({ pdop })),
      { column: 'pdop', edges: [1, 1.5, 2] },
    );
    expect(rows.map(({ group, from, to, occupations }) => [group, from, to, occupations])).toEqual([
      ['1-1.5', 1, 1.5, 1],
      ['1.5-2', 1.5, 2, 1],
      ['outside', null, null, 3],
      ['not known', null, null, 1],
    ]);
  });

  it('names the column that is missing and what asked for it', () => {
    expect(() => summarizeBy([{ ...shot(), crew: undefined, team: 'x' }], 'squad')).toThrow(
      'Expected a column "squad" in the errors, needed for the split by squad',
    );
  });

  const rowsOf = fc.array(
    fc.record({
      day: fc.constantFrom('2025-03-01', '2025-03-02', '2025-03-03', '2025-04-01'),
      mark: fc.constantFrom('M1', 'M2', ''),
      crew: fc.constantFrom('A', 'B'),
      azimuthDeg: fc.double({ min: 0, max: 359, noNaN: false }),
      solarHour: fc.double({ min: 0, max: 23.9, noNaN: false }),
      east: fc.double({ min: -50, max: 50, noNaN: true }),
      up: fc.double({ min: -50, max: 50, noNaN: true }),
    }),
    { minLength: 1, maxLength: 60 },
  );

  it('has disjoint cells that together hold every occupation and every square, in any order of rows', () => {
    fc.assert(
      fc.property(rowsOf, (list) => {
        const errors = list.map((own) => shot({ ...own, north: 0 }));
        const pairs: [SplitBy, SplitBy][] = [
          ['mark', 'crew'],
          ['month', 'direction'],
          ['day', { column: 'solarHour', edges: [0, 8, 16] }],
        ];
        for (const [first, second] of pairs) {
          const one = summarizeBy(errors, first);
          const two = summarizeByTwo(errors, first, second);
          const squares = (cells: readonly (typeof one | typeof two)[number][]): number =>
            cells.reduce((total, cell) => total + cell.occupations * cell.horizontalRms!.estimate ** 2, 0);
          for (const cells of [one, two]) {
            expect(cells.reduce((total, { occupations }) => total + occupations, 0)).toBe(errors.length);
            expect(squares(cells)).toBeCloseTo(
              errors.reduce((total, { east }) => total + east ** 2, 0),
              6,
            );
          }
          for (const { group, occupations } of one) {
            const within = two.filter((cell) => cell.first.group === group);
            expect(within.reduce((total, cell) => total + cell.occupations, 0)).toBe(occupations);
          }
          const turned = summarizeByTwo([...errors].reverse(), first, second);
          expect(turned.map(({ first: a, second: b, occupations }) => [a, b, occupations])).toEqual(
            two.map(({ first: a, second: b, occupations }) => [a, b, occupations]),
          );
          turned.forEach((cell, k) => {
            expect(cell.horizontalRms!.estimate).toBeCloseTo(two[k]!.horizontalRms!.estimate, 9);
          });
        }
      }),
      { seed: 11, numRuns: 60 },
    );
  });

  it('is the same for a table and for records', () => {
    const errors = [shot(), shot({ mark: 'M2' })];
    const table = errorTable(errors as unknown as OccupationError[]);
    expect(summarizeBy(table, 'direction')).toEqual(summarizeBy(errors, 'direction'));
  });
});

describe('visits', () => {
  const visits = [
    visit(),
    visit({ fixedRows: 0 }),
    visit({ mark: 'M2', fixedRows: 0 }),
    visit({ crew: 'B', day: '2025-03-04' }),
  ];

  it('are counted in every cell, also in one where no visit had a fix', () => {
    const rows = summarizeBy([shot(), shot()], 'mark', { visits });
    expect(rows.map((row) => [row.group, row.occupations, row.visits, row.visitsWithoutFix])).toEqual([
      ['M1', 2, 3, 1],
      ['M2', 0, 1, 1],
    ]);
    expect(rows[0]!.shareWithoutFix).toBeCloseTo(1 / 3, 12);
    expect(rows[1]).toMatchObject({
      horizontalRms: null,
      baselineKm: Number.NaN,
      tooFew: true,
      shareWithoutFix: 1,
    });
  });

  it('are counted by two columns', () => {
    const cells = summarizeByTwo([shot()], 'crew', 'day', { visits });
    expect(cells.map((cell) => [cell.first.group, cell.second.group, cell.occupations, cell.visits])).toEqual(
      [
        ['A', '2025-03-03', 1, 3],
        ['B', '2025-03-04', 0, 1],
      ],
    );
  });

  it('are not told where a visit has no such value, and a cell without visits has no share', () => {
    for (const by of ['pdop', 'occupationSeconds', 'epochs']) {
      const [row] = summarizeBy([shot()], { column: by, edges: [0, 100] }, { visits });
      expect(row).toMatchObject({ visits: null, visitsWithoutFix: null, shareWithoutFix: null });
    }
    expect(summarizeBy([shot({ mark: 'M3' })], 'mark', { visits }).at(-1)).toMatchObject({
      group: 'M3',
      visits: 0,
      shareWithoutFix: null,
    });
    expect(summarizeBy([shot()], 'mark')[0]!.visits).toBe(null);
  });
});

describe('standardSplits', () => {
  it('has every split, each with all occupations or a reason', () => {
    const errors = [shot(), shot({ mark: 'M2', azimuthDeg: 200, startMs: Number.NaN, endMs: Number.NaN })];
    const tables = standardSplits(errors, [visit()]);
    expect(tables.map(({ title }) => title)).toEqual(STANDARD_SPLITS.map(({ title }) => title));
    for (const { title, rows, reason } of tables) {
      const total = rows.reduce((sum, { occupations }) => sum + occupations, 0);
      if (reason === null) expect(total, title).toBe(2);
      else expect(rows, title).toEqual([]);
    }
    const reasonOf = (title: string) => tables.find((table) => table.title === title)!.reason;
    expect(reasonOf('support of the rod')).toBe('it is known of no occupation');
    expect(reasonOf('tilt of the rod, degrees')).toBe('it is known of no occupation');
    expect(reasonOf('mark')).toBe(null);
  });

  it('says so where there is no column, or nothing at all', () => {
    const { crew: _, ...rest } = shot();
    expect(standardSplits([rest]).find(({ title }) => title === 'crew')!.reason).toBe(
      'the errors have no such column',
    );
    for (const { rows, reason } of standardSplits([])) {
      expect([rows, reason]).toEqual([[], 'there are no occupations']);
    }
  });
});
