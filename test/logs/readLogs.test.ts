import { describe, expect, it } from 'vitest';
import { formatMessage } from '../../src/logs/index.js';
import { type ReadOptions, readText, testFolder } from '../files.js';

const folder = testFolder();
const HEADER = 'time,mark,latitude,longitude,height,fix';
const ROW = '2025-03-04T09:00:00Z,CP1,47.01,8.0,500.0,fixed';

const read = (lines: readonly string[], options?: ReadOptions) =>
  readText(folder, `${lines.join('\n')}\n`, options);

/** One row under `HEADER`, some of its cells changed. */
function row(change: Partial<Record<'time' | 'mark' | 'latitude' | 'longitude' | 'height' | 'fix', string>>) {
  const [time, mark, latitude, longitude, height, fix] = ROW.split(',');
  return Object.values({ time, mark, latitude, longitude, height, fix, ...change }).join(',');
}

/** The finding of a log of one row that is set aside. */
async function finding(line: string, options?: ReadOptions): Promise<string> {
  const { setAside, rowsRead } = await read([HEADER, line], options);
  expect(rowsRead).toBe(1);
  expect(setAside).toHaveLength(1);
  const [{ reason, column, detail, row: place }] = setAside as [(typeof setAside)[number]];
  expect([reason, place]).toEqual(['unreadable', 2]);
  return `${column}: ${detail}`;
}

async function onlyPosition(lines: readonly string[], options?: ReadOptions) {
  const { positions, setAside } = await read(lines, options);
  expect(setAside).toEqual([]);
  expect(positions).toHaveLength(1);
  return positions[0]!;
}

describe('a row', () => {
  it('becomes a position', async () => {
    const lines = [
      'time,base,setup,mark,rover,crew,latitude,longitude,height,fix,satellites,pdop,age,horizontalSigma,verticalSigma',
      '2025-03-04T09:00:00.25Z,B1,S1, 007 ,R1,Harbour,47.01,-8.5,500.125,FIXED,14,1.3,1.5,0.008,',
    ];
    expect(await onlyPosition(lines)).toEqual({
      file: 'log.csv',
      row: 2,
      utcMs: Date.UTC(2025, 2, 4, 9, 0, 0, 250),
      dateOnly: '',
      mark: '007',
      pointNumber: '',
      description: '',
      base: 'B1',
      setup: 'S1',
      rover: 'R1',
      crew: 'Harbour',
      fix: 'fixed',
      epochs: 1,
      latitudeDeg: 47.01,
      longitudeDeg: -8.5,
      heightM: 500.125,
      satellites: 14,
      pdop: 1.3,
      ageSeconds: 1.5,
      horizontalSigmaM: 0.008,
      verticalSigmaM: Number.NaN,
      extras: null,
    });
  });

  it('without coordinates has no position, whichever of them is blank', async () => {
    for (const blank of ['latitude', 'longitude', 'height']) {
      const { latitudeDeg, longitudeDeg, heightM } = await onlyPosition([HEADER, row({ [blank]: '' })]);
      expect([latitudeDeg, longitudeDeg, heightM]).toEqual([Number.NaN, Number.NaN, Number.NaN]);
    }
  });

  it('takes longitudes up to 360 degrees', async () => {
    const longitudeOf = async (longitude: string) =>
      (await onlyPosition([HEADER, row({ longitude })])).longitudeDeg;
    expect(await longitudeOf('341.5')).toBe(-18.5);
    expect(await longitudeOf('180')).toBe(180);
    expect(await longitudeOf('-180')).toBe(-180);
    expect(await longitudeOf('360')).toBe(0);
  });

  it('that cannot be read says which column, what was expected and what came', async () => {
    expect(await finding(row({ latitude: 'NaN' }))).toBe('latitude: expected a number, came "NaN"');
    expect(await finding(row({ height: 'high' }))).toBe('height: expected a number, came "high"');
    expect(await finding(row({ latitude: '91' }))).toBe(
      'latitude: expected a latitude from -90 to 90 degrees, came 91 (are latitude and longitude swapped?)',
    );
    expect(await finding(row({ longitude: '361' }))).toBe(
      'longitude: expected a longitude from -180 to 360 degrees, came 361',
    );
    expect(await finding(row({ height: '-6378137' }))).toBe(
      'height: expected a height from -10000 to 100000 metres, came -6378137',
    );
    expect(await finding(row({ height: '1e308' }))).toBe(
      'height: expected a height from -10000 to 100000 metres, came 1e+308',
    );
    expect(await finding(row({ time: 'yesterday' }))).toBe(
      'time: expected a time like 2025-03-01T10:15:00Z, came "yesterday"',
    );
    expect(await finding(`${ROW},more`)).toBe(
      'null: expected 6 cells as in the header, came 7 (does a decimal comma cut numbers in two?)',
    );
    expect(await finding('2025-03-04T09:00:00Z,CP1,47.01')).toBe(
      'null: expected 6 cells as in the header, came 3',
    );
    expect(await finding(row({ mark: '"CP1' }))).toBe(
      'null: a quote does not close in this line, or text follows a closing quote',
    );
    expect(await finding(row({ mark: 'CP\u0000' }))).toBe(
      'null: the line holds zero bytes, which text does not',
    );
    expect(await finding(row({ mark: 'x'.repeat(1_000_000) }))).toBe(
      'null: the line has more than 1000000 characters',
    );
    expect(await finding(row({ latitude: 'z'.repeat(500) }))).toBe(
      `latitude: expected a number, came "${'z'.repeat(60)}"…`,
    );
  });

  it('has a time that satellite positioning can have', async () => {
    expect((await onlyPosition([HEADER, row({ time: '1980-01-06T00:00:00Z' })])).utcMs).toBe(
      Date.UTC(1980, 0, 6),
    );
    const ranges = 'time: expected a time in the years 1980 to 2099, came';
    for (const timeZone of [null, 'Europe/Lisbon']) {
      expect(await finding(row({ time: '1970-01-01T00:00:00Z' }), { timeZone })).toBe(
        `${ranges} "1970-01-01T00:00:00Z"`,
      );
      expect(await finding(row({ time: '3000-01-01T00:00:00Z' }), { timeZone })).toBe(
        `${ranges} "3000-01-01T00:00:00Z"`,
      );
      expect(await finding(row({ time: '0000-01-01T00:00' }), { timeZone })).toBe(
        `${ranges} "0000-01-01T00:00"`,
      );
      expect(await finding(row({ time: '9999-12-31T23:59:59' }), { timeZone })).toBe(
        `${ranges} "9999-12-31T23:59:59"`,
      );
    }
  });
});

describe('local times', () => {
  const timeOf = async (time: string, timeZone: string) =>
    (await onlyPosition([HEADER, row({ time })], { timeZone })).utcMs;

  it('are read in the zone of the study', async () => {
    expect(await timeOf('2025-03-04T09:00:00', 'Etc/GMT+1')).toBe(Date.UTC(2025, 2, 4, 10));
    expect(await timeOf('2025-03-04T09:00:00', '+02:00')).toBe(Date.UTC(2025, 2, 4, 7));
    expect(await timeOf('2025-07-04 09:00', 'Europe/Paris')).toBe(Date.UTC(2025, 6, 4, 7));
    expect(await timeOf('2025-07-04T09:00+05:30', 'Europe/Paris')).toBe(Date.UTC(2025, 6, 4, 3, 30));
  });

  it('are refused without a zone, with the remedy', async () => {
    expect(await finding(row({ time: '2025-03-04T09:00:00' }))).toBe(
      'time: expected a time with Z or an offset, came "2025-03-04T09:00:00"; name the timeZone of such times in the study file',
    );
  });

  // In the European Union clocks change at 01:00 UTC on the last Sundays of March and October (directive 2000/84/EC).
  it('that a change of clocks skips or repeats are refused', async () => {
    const timeZone = 'Europe/Paris';
    expect(await finding(row({ time: '2025-03-30T02:30:00' }), { timeZone })).toBe(
      'time: expected a time that exists in Europe/Paris, came "2025-03-30T02:30:00", which the change of clocks skips',
    );
    expect(await finding(row({ time: '2025-10-26T02:30:00' }), { timeZone })).toBe(
      'time: expected a time that is unique in Europe/Paris, came "2025-10-26T02:30:00", which the change of clocks repeats; write an offset',
    );
    expect(await timeOf('2025-10-26T03:00:00', timeZone)).toBe(Date.UTC(2025, 9, 26, 2));
  });
});

describe('the fix column', () => {
  const fixOf = async (fix: string, layout = {}) =>
    (await onlyPosition([HEADER, row({ fix })], { layout })).fix;

  it('understands fixed and float in any case', async () => {
    expect(await fixOf('Fixed')).toBe('fixed');
    expect(await fixOf('FLOAT')).toBe('float');
  });

  it('needs fixValues for anything else', async () => {
    expect(await fixOf('4')).toBe('other');
    const fixValues = { '4': 'fixed', 'RTK float': 'float', none: 'other' } as const;
    expect(await fixOf('4', { fixValues })).toBe('fixed');
    expect(await fixOf('rtk FLOAT', { fixValues })).toBe('float');
    const { messages } = await read([HEADER, row({ fix: 'none' })], { layout: { fixValues } });
    expect(messages).toEqual([]);
  });

  it('tells which texts it does not know, the most frequent first', async () => {
    const fixes = ['fixed', '5', '4', '4', '', 'float'];
    const { messages } = await read([HEADER, ...fixes.map((fix) => row({ fix }))]);
    expect(messages.map(formatMessage)).toEqual([
      'log.csv:3 [fix] warning: Expected "fixed" or "float", came "4" in 2 rows, "5" in 1 row, a blank cell in 1 row: these count as not fixed. Say in fixValues of the layout what they mean.',
    ]);
  });

  it('says nothing of rows without a position', async () => {
    const { messages } = await read([HEADER, ROW, row({ latitude: '', fix: '' })]);
    expect(messages).toEqual([]);
  });

  it('when there is none every row counts as fixed, and that is said', async () => {
    const { positions, messages } = await read(['time,mark,latitude,longitude,height', ROW.slice(0, -6)]);
    expect(positions[0]!.fix).toBe('fixed');
    expect(messages.map(formatMessage)).toEqual([
      'log.csv info: The log has no column "fix": every row counts as fixed. Export the state of the fix where the controller can.',
    ]);
  });
});

describe('figures of merit that cannot be read', () => {
  it('are told once a column, and the row is read without them', async () => {
    const { positions, messages, setAside } = await read([
      `${HEADER},pdop,satellites`,
      `${ROW},good,12`,
      `${ROW},1.4,many`,
      `${ROW},,`,
      `${ROW},bad,12`,
    ]);
    expect(setAside).toEqual([]);
    expect(positions.map(({ pdop }) => pdop)).toEqual([Number.NaN, 1.4, Number.NaN, Number.NaN]);
    expect(messages.map(formatMessage)).toEqual([
      'log.csv:2 [pdop] warning: Expected a number, came "good": 2 rows are read without this value. Leave the cell blank where nothing is known.',
      'log.csv:3 [satellites] warning: Expected a number, came "many": 1 row is read without this value. Leave the cell blank where nothing is known.',
    ]);
  });
});

describe('other coordinates', () => {
  // 6378137 m is the equatorial radius of WGS 84.
  it('geocentric metres, and nothing that lies far from the surface', async () => {
    const lines = (cells: string) => ['time,mark,x,y,z', `2025-03-04T09:00:00Z,CP1,${cells}`];
    const options = { coordinates: 'geocentric' };
    const there = await onlyPosition(lines('6378137,0,0'), options);
    expect([there.latitudeDeg, there.longitudeDeg]).toEqual([0, 0]);
    expect(there.heightM).toBeCloseTo(0, 6);
    for (const cells of ['0,0,0', '6378.137,0,0', '1e300,1e300,1e300', '1e-9,0,0']) {
      const { setAside } = await read(lines(cells), options);
      expect(setAside.map(({ column }) => column)).toEqual(['x']);
      expect(setAside[0]!.detail).toMatch(/^expected geocentric metres near the earth's surface, came /);
    }
    const { positions } = await read(lines('6378137,,0'), options);
    expect(positions[0]!.latitudeDeg).toBeNaN();
  });

  it('a projection, and nothing beyond its reach', async () => {
    const lines = (cells: string) => [
      'time,mark,easting,northing,height',
      `2025-03-04T09:00:00Z,CP1,${cells}`,
    ];
    const options = { coordinates: '+proj=utm +zone=32 +ellps=WGS84' };
    // On its central meridian, 9° E for zone 32, every transverse Mercator zone has the easting 500 000 m.
    const there = await onlyPosition(lines('500000,0,12.5'), options);
    expect(there.latitudeDeg).toBeCloseTo(0, 12);
    expect(there.longitudeDeg).toBeCloseTo(9, 12);
    expect(there.heightM).toBe(12.5);
    const { setAside } = await read(lines('1e200,5,0'), options);
    expect(setAside[0]).toMatchObject({
      column: 'easting',
      detail: 'expected a place within the reach of the projection, came easting 1e+200 and northing 5',
    });
    const high = await read(lines('500000,0,1e7'), options);
    expect(high.setAside[0]).toMatchObject({ column: 'height' });
  });
});

describe('an empty log', () => {
  it.each([
    ['', 'an empty file'],
    ['\ufeff\n\n# nothing\n', 'an empty file'],
    [`${HEADER}\n`, 'a header alone'],
  ])('%j', async (text, came) => {
    const { rowsRead, messages } = await readText(folder, text);
    expect(rowsRead).toBe(0);
    expect(messages.map(formatMessage)).toEqual([
      `log.csv warning: Expected a header and positions, came ${came}. Export it again.`,
    ]);
  });
});
