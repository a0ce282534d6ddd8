import { describe, expect, it } from 'vitest';
import { formatMessage, roleOfHeader } from '../../src/logs/index.js';
import { type ReadOptions, readText, testFolder } from '../files.js';

const folder = testFolder();
const CELLS = ['2025-03-04T09:00:00Z', 'CP1', '47.01', '8.0', '500.0', 'fixed'];
const ROLES = ['time', 'mark', 'latitude', 'longitude', 'height', 'fix'];

const read = (lines: readonly string[], options?: ReadOptions) =>
  readText(folder, `${lines.join('\n')}\n`, options);
const texts = async (lines: readonly string[], options?: ReadOptions) =>
  (await read(lines, options)).messages.map(formatMessage);

describe('roleOfHeader', () => {
  it.each([
    ['latitude', 'latitude'],
    ['Latitude (deg)', 'latitude'],
    ['LATITUDE', 'latitude'],
    ['horizontal_sigma', 'horizontalSigma'],
    ['Horizontal-Sigma (m)', 'horizontalSigma'],
    ['Age', 'ageSeconds'],
    ['age seconds', 'ageSeconds'],
    ['Lat.', 'latitude'],
    ['Ell. height [m]', 'height'],
    ['Pt No', 'pointNumber'],
    ['# Sats', 'satellites'],
    ['wheelbarrow', null],
    ['', null],
    ['constructor', null],
  ])('%j is %j', (header, role) => {
    expect(roleOfHeader(header)).toBe(role);
  });
});

describe('the delimiter', () => {
  it.each([
    ['comma', ','],
    ['semicolon', ';'],
    ['tab', '\t'],
    ['pipe', '|'],
  ])('%s is found by the header, or named', async (name, character) => {
    const lines = [ROLES.join(character), CELLS.join(character)];
    expect((await read(lines)).positions).toHaveLength(1);
    expect((await read(lines, { layout: { delimiter: name } })).positions).toHaveLength(1);
    expect((await read(lines, { layout: { delimiter: character } })).positions).toHaveLength(1);
  });

  it('may be any text, also one that is the name of something in JavaScript', async () => {
    for (const delimiter of ['||', '~', 'constructor']) {
      const lines = [ROLES.join(delimiter), CELLS.join(delimiter)];
      expect((await read(lines, { layout: { delimiter } })).positions).toHaveLength(1);
    }
  });

  it('is found too where only the layout knows the headers', async () => {
    const columns = { time: 'T', mark: 'P', latitude: 'B', longitude: 'L', height: 'H' } as const;
    const { positions } = await read(['T;P;B;L;H', CELLS.slice(0, 5).join(';')], { layout: { columns } });
    expect(positions).toHaveLength(1);
  });

  it('with decimal commas: the message names them', async () => {
    const { setAside } = await read([
      ROLES.join(';'),
      CELLS.join(';').replaceAll('.', ','),
      CELLS.join(';').replace('500.0', '500,0'),
    ]);
    expect(setAside.map(({ column, detail }) => `${column}: ${detail}`)).toEqual([
      'latitude: expected a number, came "47,01" with a decimal comma; state decimal: comma in the layout',
      'height: expected a number, came "500,0" with a decimal comma; state decimal: comma in the layout',
    ]);
  });
});

describe('a header', () => {
  it('may have its columns in any order, in any writing, with comments and blank lines above', async () => {
    const { positions } = await read([
      '# exported',
      '',
      'Height (m), FIX ,Longitude,"Latitude (deg)",Mark,TIME',
      '500.0,fixed,8.0,47.01,CP1,2025-03-04T09:00:00Z',
    ]);
    expect(positions[0]).toMatchObject({ row: 4, mark: 'CP1', latitudeDeg: 47.01, heightM: 500 });
  });

  it('may end with columns that have no name, with or without cells below them', async () => {
    const { positions, messages } = await read([
      `${ROLES.join(',')},,`,
      CELLS.join(','),
      `${CELLS.join(',')},,`,
      `${CELLS.join(',')},a,b`,
      `${CELLS.join(',')},,,,`,
    ]);
    expect(positions).toHaveLength(4);
    expect(messages).toEqual([]);
  });

  it('that lacks a column names it, the columns that came and a likely meaning', async () => {
    const lines = ['time,mark,lattitude,longitude,height,fix', CELLS.join(',')];
    expect(await texts(lines)).toEqual([
      'log.csv:1 [latitude] error: Expected a column "latitude", came "time", "mark", "lattitude", "longitude", "height", "fix". Did you mean "lattitude"? Add the column or name it in the layout.',
      'log.csv:1 [lattitude] info: Columns that are no role are not read: "lattitude". Did you mean "latitude"? Correct the header or name the column in the layout if so.',
    ]);
    const { rowsRead, setAside } = await read(lines);
    expect(rowsRead).toBe(1);
    expect(setAside).toEqual([
      {
        file: 'log.csv',
        row: 2,
        reason: 'unreadable',
        column: null,
        detail: 'the header above this row was not understood',
      },
    ]);
  });

  it('with two columns of one role is not guessed at', async () => {
    expect(await texts([`${ROLES.join(',')},Latitude (deg)`, `${CELLS.join(',')},1`])).toEqual([
      'log.csv:1 [Latitude (deg)] error: Two columns, "latitude" and "Latitude (deg)", have the role latitude. Rename the one that is not meant.',
    ]);
  });

  it('is read as the layout says, whatever else spells the role', async () => {
    const columns = { height: 'Ellipsoid height', rover: 'mark', mark: 'mark' } as const;
    const { positions, messages } = await read(
      [`${ROLES.join(',')},Ellipsoid height`, `${CELLS.join(',')},547.25`],
      { layout: { columns } },
    );
    expect(positions[0]).toMatchObject({ heightM: 547.25, mark: 'CP1', rover: 'CP1' });
    expect(messages.map(({ code }) => code)).toEqual(['ignored-column']);
  });

  it('that lacks a column which the layout names is refused', async () => {
    const layout = { columns: { mark: 'Point' } } as const;
    expect(
      await texts(['time,Points,latitude,longitude,height', CELLS.slice(0, 5).join(',')], { layout }),
    ).toEqual([
      'log.csv:1 [Point] error: The layout names a column "Point" for mark, the file has none. Did you mean "Points"? Correct the layout or the header.',
      'log.csv:1 [Points] info: Columns that are no role are not read: "Points".',
    ]);
  });

  it('of thousands of columns is told in short', async () => {
    const many = Array.from({ length: 5000 }, (_, k) => `column number ${k}`);
    const [message] = await texts([`time,${many.join(',')}`]);
    expect(message!.length).toBeLessThan(1000);
    expect(message).toContain(' and 4981 more.');
  });

  it('comes again without notice, also in other writing', async () => {
    const { rowsRead, messages } = await read([
      ROLES.join(','),
      CELLS.join(','),
      ROLES.join(','),
      CELLS.join(','),
      `\ufeff${ROLES.join(' , ').toUpperCase()}`,
      CELLS.join(','),
    ]);
    expect(rowsRead).toBe(3);
    expect(messages).toEqual([]);
  });

  it('that comes again with other columns is followed, and that is said', async () => {
    const { positions, messages, setAside } = await read([
      ROLES.join(','),
      CELLS.join(','),
      'time,mark,longitude,latitude,height,fix',
      '2025-03-04T09:00:01Z,CP1,8.0,47.01,500.0,fixed',
      'time,mark,longitude,latitude,height,fix,crew',
      '2025-03-04T09:00:02Z,CP1,8.0,47.01,500.0,fixed,A',
    ]);
    expect(setAside).toEqual([]);
    expect(positions.map(({ latitudeDeg, longitudeDeg, crew }) => [latitudeDeg, longitudeDeg, crew])).toEqual(
      [
        [47.01, 8, ''],
        [47.01, 8, ''],
        [47.01, 8, 'A'],
      ],
    );
    const text =
      'Expected rows under the first header, came a header with other columns: the rows below it are read by it. Check that this file was joined on purpose.';
    expect(messages.map(formatMessage)).toEqual([`log.csv:3 warning: ${text}`, `log.csv:5 warning: ${text}`]);
  });

  it('that comes again without a column that is needed stops the reading there', async () => {
    const { positions, setAside, rowsRead, messages } = await read([
      ROLES.join(','),
      CELLS.join(','),
      'time,latitude,longitude,height,fix,crew',
      '2025-03-04T09:00:01Z,47.01,8.0,500.0,fixed,A',
      ROLES.join(','),
      CELLS.join(','),
    ]);
    expect([rowsRead, positions.length]).toEqual([3, 2]);
    expect(setAside.map(({ row }) => row)).toEqual([4]);
    expect(messages.map(({ code, row }) => `${code} ${row}`)).toEqual([
      'changed-header 3',
      'missing-column 3',
      'changed-header 5',
    ]);
  });

  it('is not mistaken in data whose names are words like base and rover', async () => {
    const { positions, rowsRead } = await read([
      'time,base,rover,crew,mark,latitude,longitude,height,fix',
      '2025-03-04T09:00:00Z,base,rover,crew,mark,47.01,8.0,500.0,fixed',
      '2025-03-04T09:00:00Z,base,rover,crew,mark,,,,fixed',
    ]);
    expect([rowsRead, positions.length]).toEqual([2, 2]);
  });

  it('below lines of a title is found, and the title counts as rows that cannot be read', async () => {
    const { positions, setAside, rowsRead, messages } = await read([
      'Check shots',
      'spring; 2025',
      ROLES.join(';'),
      CELLS.join(';'),
    ]);
    expect([rowsRead, positions.length]).toEqual([3, 1]);
    expect(setAside.map(({ row }) => row)).toEqual([1, 2]);
    expect(messages.map(({ code }) => code)).toEqual(['no-header', 'changed-header']);
  });
});

describe('a file that is no log', () => {
  it('without a header says what the first line must hold', async () => {
    expect(await texts([CELLS.join(','), CELLS.join(',')])).toEqual([
      `log.csv:1 error: Expected a header that names the columns "time", "mark", "latitude", "longitude", "height", came "${CELLS.join(',')}". Write the names of the columns into the first line.`,
    ]);
    expect((await read([CELLS.join(','), CELLS.join(',')])).rowsRead).toBe(2);
  });

  it('of binary data says so', async () => {
    const bytes = Uint8Array.from({ length: 3000 }, (_, k) => (k * k * 7 + 3 * k + 128) % 256);
    const { messages, positions, rowsRead, setAside } = await readText(folder, bytes);
    expect(positions).toEqual([]);
    expect(setAside).toHaveLength(rowsRead);
    expect(messages[0]!.text).toBe(
      'Expected delimited text, came binary data. Export the positions as text (CSV) and name that file.',
    );
  });
});

describe('the encoding', () => {
  const text = [ROLES.join(','), CELLS.join(','), CELLS.join(',').replace('CP1', 'Mühle')].join('\r\n');
  const marks = async (bytes: Uint8Array, options?: ReadOptions) => {
    const { positions, messages } = await readText(folder, bytes, options);
    return [positions.map(({ mark }) => mark), messages.map(({ code }) => code)];
  };
  it('is seen: UTF-8, with and without a byte-order mark, and UTF-16 in both orders', async () => {
    const utf16 = (mark: string) => Buffer.from(`${mark}${text}`, 'utf16le');
    for (const bytes of [
      Buffer.from(text),
      Buffer.from(`\ufeff${text}`),
      utf16('\ufeff'),
      utf16('\ufeff').swap16(),
    ]) {
      expect(await marks(bytes)).toEqual([['CP1', 'Mühle'], []]);
    }
  });
  it('of one byte a letter is guessed with a message, or stated', async () => {
    const bytes = Buffer.from(text, 'latin1');
    expect(await marks(bytes)).toEqual([['CP1', 'Mühle'], ['guessed-encoding']]);
    expect(await marks(bytes, { layout: { encoding: 'latin1' } })).toEqual([['CP1', 'Mühle'], []]);
    expect(await marks(bytes, { layout: { encoding: 'utf-8' } })).toEqual([
      ['CP1', 'M\ufffdhle'],
      ['not-utf8'],
    ]);
    expect(await marks(Buffer.from(text, 'utf16le'))).toEqual([['CP1', 'Mühle'], ['guessed-encoding']]);
  });
});
