import { describe, expect, it } from 'vitest';
import type { Control } from '../../src/control/index.js';
import {
  computeErrors,
  type FormOccupationsOptions,
  formOccupations,
  type Occupation,
} from '../../src/errors/index.js';
import { formatMessage, type Position, type SetAsideRow } from '../../src/logs/index.js';
import { at, BASES, batches, control, MARKS, START_MS } from './world.js';

const form = (
  positions: readonly Position[],
  options: FormOccupationsOptions = {},
  known: Control = control(),
) => formOccupations(batches(positions), known, options);

const seconds = ({ startMs, endMs, epochs }: Occupation) => [
  (startMs - START_MS) / 1000,
  (endMs - START_MS) / 1000,
  epochs,
];

/** `count` rows a second apart from `from` on. */
const run = (from: number, count: number, change: Partial<Position> = {}): Position[] =>
  Array.from({ length: count }, (_, k) => at(from + k, change));

describe('visits and occupations', () => {
  it('end where the gap exceeds gapSeconds, not where it equals it', async () => {
    const positions = [at(0), at(60), at(121)];
    expect((await form(positions)).occupations.map(seconds)).toEqual([
      [0, 60, 2],
      [121, 121, 1],
    ]);
    expect((await form(positions, { gapSeconds: 59 })).occupations).toHaveLength(3);
    expect((await form(positions, { gapSeconds: 61 })).occupations).toHaveLength(1);
  });

  it('belong to one rover, mark, base and setup', async () => {
    const two = control(MARKS, BASES);
    const positions = [
      at(0),
      at(1, { rover: 'R2' }),
      at(2, { mark: 'CP2' }),
      at(3, { base: 'B2' }),
      at(4, { setup: 'second' }),
      at(5),
    ];
    const { occupations, visits } = await form(positions, {}, two);
    expect(occupations.map(seconds)).toEqual([
      [0, 5, 2],
      [1, 1, 1],
      [2, 2, 1],
      [3, 3, 1],
      [4, 4, 1],
    ]);
    expect(visits).toHaveLength(5);
  });

  it('counts a visit that never got a fix', async () => {
    const float = run(1000, 5, { fix: 'float' });
    const none = run(2000, 3, { latitudeDeg: Number.NaN, fix: 'other' });
    const { occupations, visits, files } = await form([...run(0, 3), ...float, ...none]);
    expect(occupations.map(seconds)).toEqual([[0, 2, 3]]);
    expect(visits.map(({ rows, fixedRows }) => [rows, fixedRows])).toEqual([
      [3, 3],
      [5, 0],
      [3, 0],
    ]);
    expect(files).toEqual([
      {
        file: 'a.csv',
        read: 11,
        used: 3,
        setAside: {
          'not-fixed': { count: 5, firstRows: float.map(({ row }) => row) },
          'no-position': { count: 3, firstRows: none.map(({ row }) => row) },
        },
      },
    ]);
  });

  it('float rows between fixed ones belong to the visit, and part the occupation only when they last', async () => {
    const short = [...run(0, 2), ...run(2, 30, { fix: 'float' }), ...run(32, 2)];
    expect((await form(short)).occupations.map(seconds)).toEqual([[0, 33, 4]]);
    const long = [...run(0, 2), ...run(2, 100, { fix: 'float' }), ...run(102, 2)];
    const { occupations, visits } = await form(long);
    expect(occupations.map(seconds)).toEqual([
      [0, 1, 2],
      [102, 103, 2],
    ]);
    expect(visits.map(({ rows, fixedRows }) => [rows, fixedRows])).toEqual([[104, 4]]);
  });

  it('averages, and states the scatter of single epochs', async () => {
    const { heightM, latitudeDeg } = MARKS.CP1!;
    const positions = [
      at(0, { heightM: heightM + 0.01, satellites: 10, pdop: 1 }),
      at(1, { heightM: heightM + 0.02, satellites: 14 }),
      at(2, { heightM: heightM + 0.03, pdop: 2 }),
    ];
    const [occupation] = (await form(positions)).occupations;
    expect(occupation!.position.heightM).toBeCloseTo(heightM + 0.02, 8);
    expect(occupation!.position.latitudeDeg).toBeCloseTo(latitudeDeg, 12);
    // The standard deviation of 10, 20 and 30 with n − 1 is 10.
    expect(occupation!.scatterUpMm).toBeCloseTo(10, 5);
    expect(occupation!.scatterEastMm).toBeCloseTo(0, 5);
    expect([occupation!.satellites, occupation!.pdop, occupation!.ageSeconds]).toEqual([12, 1.5, Number.NaN]);
    const [single] = (await form([at(0)])).occupations;
    expect(single!.scatterUpMm).toBeNaN();
  });

  it('takes crew, file and row from its first epoch', async () => {
    const positions = [at(5, { crew: 'late', row: 9 }), at(0, { crew: 'early', row: 4 })];
    expect((await form(positions)).occupations[0]).toMatchObject({ crew: 'early', file: 'a.csv', row: 4 });
  });
});

describe('setups', () => {
  const setupsOf = async (mounting: 'pillar' | 'tripod', change: Partial<Position> = {}) => {
    const positions = [at(0, change), at(86_400, change)];
    const known = control(MARKS, { B1: BASES.B1! }, mounting);
    const { occupations } = await form(positions, { timeZone: 'UTC' }, known);
    return occupations.map(({ setup }) => setup);
  };

  it('a tripod is set up anew every day, a pillar is not', async () => {
    expect(await setupsOf('tripod')).toEqual(['B1 2025-03-04', 'B1 2025-03-05']);
    expect(await setupsOf('pillar')).toEqual(['B1', 'B1']);
  });

  it('a setup that the log names stands, whatever the mounting', async () => {
    expect(await setupsOf('tripod', { setup: 'S7' })).toEqual(['S7', 'S7']);
    expect(await setupsOf('pillar', { setup: 'S7' })).toEqual(['S7', 'S7']);
  });
});

describe('days', () => {
  // 23:45 UTC; the base stands at 8° east, where mean solar time is 32 minutes ahead (four minutes a degree).
  const late = Date.UTC(2025, 2, 4, 23, 45);
  const dayOf = async (timeZone: string | null) =>
    (await form([at(0, { utcMs: late })], { timeZone })).occupations[0]!.day;

  it('are those of the time zone, or of mean solar time at the base', async () => {
    expect(await dayOf('UTC')).toBe('2025-03-04');
    expect(await dayOf('Europe/Paris')).toBe('2025-03-05');
    expect(await dayOf('America/New_York')).toBe('2025-03-04');
    expect(await dayOf(null)).toBe('2025-03-05');
  });

  it('a visit over midnight stays one from a pillar, on the day on which it begins', async () => {
    const positions = [at(0, { utcMs: late + 890_000 }), at(0, { utcMs: late + 910_000 })];
    const { occupations, visits } = await form(positions, { timeZone: 'UTC' });
    expect(occupations.map(({ day, epochs }) => [day, epochs])).toEqual([['2025-03-04', 2]]);
    expect(visits.map(({ day, rows }) => [day, rows])).toEqual([['2025-03-04', 2]]);
  });

  it('from a tripod a new day is a new setup, so the visit over midnight is two', async () => {
    const positions = [at(0, { utcMs: late + 890_000 }), at(0, { utcMs: late + 910_000 })];
    const tripod = control(MARKS, { B1: BASES.B1! }, 'tripod');
    const { occupations } = await form(positions, { timeZone: 'UTC' }, tripod);
    expect(occupations.map(({ day, setup }) => [day, setup])).toEqual([
      ['2025-03-04', 'B1 2025-03-04'],
      ['2025-03-05', 'B1 2025-03-05'],
    ]);
  });

  it('outside the period are set aside, its first and last day are not', async () => {
    const positions = [-86_400, 0, 86_400, 172_800].map((second) => at(second));
    const aside: SetAsideRow[] = [];
    const { occupations } = await form(positions, {
      timeZone: 'UTC',
      period: { from: '2025-03-04', to: '2025-03-05' },
      onSetAside: (row) => aside.push(row),
    });
    expect(occupations.map(({ day }) => day)).toEqual(['2025-03-04', '2025-03-05']);
    expect(aside.map(({ reason, detail }) => `${reason}: ${detail}`)).toEqual([
      'outside-study: day 2025-03-03',
      'outside-study: day 2025-03-06',
    ]);
  });
});

describe('rows at the same time', () => {
  const asideOf = async (positions: readonly Position[]) => {
    const aside: string[] = [];
    const { occupations, messages } = await form(positions, {
      onSetAside: ({ row, reason }) => aside.push(`${row} ${reason}`),
    });
    return { aside: aside.sort(), epochs: occupations.map(({ epochs }) => epochs), messages };
  };
  const { heightM } = MARKS.CP1!;

  it('with the same coordinates count once; the first row is used', async () => {
    const twice = [at(0, { row: 2 }), at(0, { row: 3 }), at(0, { row: 4 }), at(1, { row: 5 })];
    const { aside, epochs, messages } = await asideOf(twice);
    expect(aside).toEqual(['3 duplicate', '4 duplicate']);
    expect(epochs).toEqual([2]);
    expect(messages).toEqual([]);
  });

  it('are the same within a tenth of a millimetre', async () => {
    expect((await asideOf([at(0), at(0, { heightM: heightM + 0.00009 })])).epochs).toEqual([1]);
    expect((await asideOf([at(0), at(0, { heightM: heightM + 0.00011 })])).epochs).toEqual([]);
  });

  it('with other coordinates conflict, and none of them is used', async () => {
    const positions = [at(0, { row: 2 }), at(0, { row: 3, heightM: heightM + 1 }), at(1, { row: 4 })];
    const { aside, epochs, messages } = await asideOf(positions);
    expect(aside).toEqual(['2 conflicting', '3 conflicting']);
    expect(epochs).toEqual([1]);
    expect(messages.map(formatMessage)).toEqual([
      'a.csv:2 warning: 2 rows are set aside as conflicting: two positions at the same time on one mark. One rover cannot be at two places: all of them are set aside. Look for a wrong mark name or a joined file.',
    ]);
  });

  it('a float row beside a fixed one is no conflict', async () => {
    const { aside, epochs } = await asideOf([
      at(0, { row: 2 }),
      at(0, { row: 3, fix: 'float', heightM: heightM + 1 }),
    ]);
    expect(aside).toEqual(['3 not-fixed']);
    expect(epochs).toEqual([1]);
  });

  it('of two rovers are two positions', async () => {
    expect((await asideOf([at(0), at(0, { rover: 'R2' })])).epochs).toEqual([1, 1]);
  });
});

describe('rows that belong nowhere', () => {
  it('are set aside with the likely name', async () => {
    const aside: SetAsideRow[] = [];
    const positions = [at(0, { mark: 'CP-1' }), at(1, { mark: '' }), at(2, { base: 'B-1' })];
    const { files, messages } = await form(positions, { onSetAside: (row) => aside.push(row) });
    expect(aside.map(({ reason, detail }) => `${reason}: ${detail}`)).toEqual([
      'unknown-mark: no mark is named "CP-1" (did you mean "CP1"?)',
      'unknown-mark: the row names no mark',
      'unknown-base: no base is named "B-1" (did you mean "B1"?)',
    ]);
    expect(files[0]!.setAside['unknown-mark']!.count).toBe(2);
    expect(messages).toHaveLength(3);
  });

  it('so far from their mark that the coordinates cannot be meant', async () => {
    const swapped = { latitudeDeg: MARKS.CP1!.longitudeDeg, longitudeDeg: MARKS.CP1!.latitudeDeg };
    const antipode = { latitudeDeg: -47.01, longitudeDeg: -172 };
    const { occupations, messages } = await form([at(0), at(1, swapped), at(2, antipode), at(3)]);
    expect(occupations.map(seconds)).toEqual([[0, 3, 2]]);
    expect(messages.map(({ text }) => text)).toEqual([
      '2 rows are set aside as unreadable: positions on mark "CP1" are more than 1000 km from it; if it is one mark, check its coordinates, if it is all, look for swapped columns or another coordinate system. Correct the rows or export them again.',
    ]);
  });
});

describe('computeErrors', () => {
  const known = control();
  const shots = (name: string, dUpM: number, count = 3) =>
    Array.from({ length: count }, (_, k) =>
      at(600 * k, { mark: name, heightM: MARKS[name]!.heightM + dUpM + 0.001 * k }),
    );
  const computed = async (positions: readonly Position[], there: Control = known) =>
    computeErrors((await form(positions, {}, there)).occupations, there);

  it('names a mark that is 1 m wrong and keeps it', async () => {
    const { errors, setAside, messages } = await computed([
      ...shots('CP1', 0.004),
      ...shots('CP2', 1),
      ...shots('CP3', -0.006),
    ]);
    expect([errors.length, setAside.length]).toEqual([9, 0]);
    expect(messages.map(formatMessage)).toEqual([
      'warning: Mark "CP2" is measured 1.001 m from its known coordinates (east 0, north 0, up +1001 mm, medians of 3 occupations on 1 day), other marks 5 mm. It is kept and spoils the fit: check its coordinates, its name and its frame.',
    ]);
  });

  it('names it beside a single other mark too', async () => {
    const { messages } = await computed([...shots('CP1', 0.004), ...shots('CP2', 1)]);
    expect(messages.map(({ code }) => code)).toEqual(['mark-far-off']);
  });

  it('takes an offset of most marks for a cause of the whole study', async () => {
    const { errors, messages } = await computed([
      ...shots('CP1', 2),
      ...shots('CP2', 2),
      ...shots('CP3', 0.006),
    ]);
    expect(errors).toHaveLength(9);
    expect(messages.map(({ text }) => text)).toEqual([
      'At least half of the 3 marks are measured 2.001 m or more from the known coordinates. Nothing is set aside for it, and it spoils the fit: check the coordinates of the base, the frames of base and marks, the kind of heights and the antenna heights.',
    ]);
    const one = await computed(shots('CP1', 2));
    expect(one.messages[0]!.text).toMatch(/^The only mark is measured 2\.001 m or more from /);
  });

  it('sets aside what is more than 10 m off, with the place of the first', async () => {
    const { errors, setAside, messages } = await computed([
      ...shots('CP1', 0.004, 9),
      ...shots('CP2', 9.99, 1),
      ...[at(0, { mark: 'CP3', row: 77, heightM: MARKS.CP3!.heightM - 10.01 })],
    ]);
    expect(errors).toHaveLength(10);
    expect(setAside.map(({ reason, error }) => [reason, error.mark])).toEqual([['error-over-10-m', 'CP3']]);
    expect(messages.map(formatMessage)).toContain(
      'a.csv:77 warning: 1 occupation is more than 10 m from the known coordinates and set aside: on mark "CP3", by 10.0 m. Check the name of the mark and the coordinates.',
    );
  });

  it('of many asks for the cause of the whole study', async () => {
    const { setAside, messages } = await computed([...shots('CP1', 47, 3), ...shots('CP2', 47, 2)]);
    expect(setAside).toHaveLength(5);
    expect(messages.map(({ text }) => text)).toEqual([
      '5 of 5 occupations are more than 10 m from the known coordinates and set aside: on 2 marks, the first on mark "CP1", by 47.0 m. So many have one cause: check units, coordinate system, height system, and the coordinates of marks and bases.',
    ]);
  });

  it('names the one mark that all far occupations are on', async () => {
    const { messages } = await computed([...shots('CP1', 0.004, 9), ...shots('CP2', 47, 2)]);
    expect(messages.map(({ text }) => text)).toEqual([
      '2 of 11 occupations are more than 10 m from the known coordinates and set aside: all on mark "CP2", the first by 47.0 m. Check the name of the mark and the coordinates.',
    ]);
  });

  it('states errors only for what is known of a mark', async () => {
    const { latitudeDeg, longitudeDeg, heightM } = MARKS.CP1!;
    const unknown = Number.NaN;
    const plan = control({ CP1: { latitudeDeg, longitudeDeg, heightM: unknown } });
    const height = control({ CP1: { latitudeDeg: unknown, longitudeDeg: unknown, heightM } });
    const shot = at(0, { heightM: heightM + 0.012, latitudeDeg: latitudeDeg + 1e-7 });
    const [inPlan] = (await computed([shot], plan)).errors;
    expect(inPlan!.north).toBeCloseTo(11.1, 1);
    expect(inPlan!.up).toBeNaN();
    const [inHeight] = (await computed([shot], height)).errors;
    expect(inHeight!.up).toBeCloseTo(12, 4);
    expect([inHeight!.east, inHeight!.north, inHeight!.along, inHeight!.across]).toEqual([
      unknown,
      unknown,
      unknown,
      unknown,
    ]);
    for (const error of [inPlan!, inHeight!]) expect(error.baselineKm).toBeCloseTo(1.112, 2);
  });

  it('of a mark on the base itself has no direction', async () => {
    const there = control({ CP1: BASES.B1! });
    const [error] = (await computed([at(0, BASES.B1!)], there)).errors;
    expect([error!.baselineKm, error!.azimuthDeg, error!.along]).toEqual([0, Number.NaN, Number.NaN]);
    expect(error!.east).toBeCloseTo(0, 6);
  });

  it('refuses control that does not hold the marks of the occupations', async () => {
    const { occupations } = await form([at(0)]);
    expect(() => computeErrors(occupations, control({ CP2: MARKS.CP2! }))).toThrow(
      new RangeError(
        'Expected an occupation of a known mark from a known base, came mark "CP1" and base "B1" on 2025-03-04. Use the control with which the occupations were formed.',
      ),
    );
  });

  it('does not change what it is given', async () => {
    const { occupations } = await form(shots('CP1', 0.004));
    const frozen = Object.freeze(occupations.map((occupation) => Object.freeze(occupation)));
    expect(computeErrors(frozen, known).errors).toHaveLength(3);
  });
});
