import { describe, expect, it } from 'vitest';
import { testFolder } from '../files.js';
import { decisive, file, readRecognized, recognized } from './heads.js';

const folder = testFolder();
const ROLES = ['time', 'mark', 'latitude', 'longitude', 'height', 'fix'];
const CELLS = ['2025-03-04T09:00:00Z', 'CP1', '47.010000001', '-8.000000001', '500.123', 'fixed'];
const PLACE = { mark: 'CP1', latitudeDeg: 47.010000001, longitudeDeg: -8.000000001, heightM: 500.123 };
const AT_9 = Date.UTC(2025, 2, 4, 9);

describe('a file that spells everything', () => {
  it.each([',', ';', '\t', '|'])('with %j needs nothing but its kind', async (delimiter) => {
    const text = file(ROLES.join(delimiter), CELLS.join(delimiter), CELLS.join(delimiter));
    const { found, log } = await readRecognized(folder, text);
    expect(found.layout).toEqual({ kind: 'delimited' });
    expect(found.unsure).toEqual([]);
    expect(log.positions).toHaveLength(2);
    expect(log.positions[0]).toMatchObject({ ...PLACE, utcMs: AT_9, fix: 'fixed', row: 2 });
  });

  it('also with a repeated header, ragged rows, damaged cells, comments and blank lines', async () => {
    const bad = CELLS.with(2, 'north');
    const text = file(
      '# exported',
      '',
      ROLES.join(),
      CELLS.join(),
      bad.join(),
      ROLES.join(),
      CELLS.with(0, 'soon').join(),
      CELLS.slice(0, 3).join(),
      ...Array.from({ length: 5 }, () => CELLS.join()),
    );
    const { found, log } = await readRecognized(folder, text);
    expect(found.layout).toEqual({ kind: 'delimited' });
    expect(log.positions).toHaveLength(6);
    expect(log.setAside.map(({ row }) => row)).toEqual([5, 7, 8]);
    expect(found.unsure.map(({ code, decisive: must }) => [code, must])).toEqual([
      ['unreadable-rows', false],
    ]);
  });

  it('also when many first rows have no position yet', async () => {
    const blank = ['2025-03-04T09:00:00Z', 'CP1', '', '', '', ''].join();
    const { found, log } = await readRecognized(
      folder,
      file(ROLES.join(), ...Array.from({ length: 9 }, () => blank), CELLS.join()),
    );
    expect(found.layout).toEqual({ kind: 'delimited' });
    expect(log.rowsRead).toBe(10);
  });

  it('also in UTF-16, with a byte-order mark, and with lone CR', async () => {
    const text = file(ROLES.join(), CELLS.with(1, 'Mühle').join());
    for (const content of [
      Buffer.from(`\ufeff${text}`, 'utf16le'),
      Buffer.from(`\ufeff${text}`),
      text.replaceAll('\n', '\r'),
    ]) {
      const { found, log } = await readRecognized(folder, content);
      expect(found.layout).toEqual({ kind: 'delimited' });
      expect(log.positions[0]).toMatchObject({ ...PLACE, mark: 'Mühle' });
    }
  });

  it('in quotes, with delimiters inside', async () => {
    const text = file(
      ROLES.join(),
      CELLS.with(1, 'CP 1, east')
        .map((cell) => `"${cell}"`)
        .join(),
    );
    const { found, log } = await readRecognized(folder, text);
    expect(found.layout).toEqual({ kind: 'delimited' });
    expect(log.positions[0]!.mark).toBe('CP 1, east');
  });
});

describe('a header', () => {
  it('below title lines: they are passed over, and this is told', async () => {
    const text = file(
      'Job harbour, east side',
      'Exported 2025-03-14 by crew 2',
      '',
      ROLES.join(),
      CELLS.join(),
    );
    const { found, log } = await readRecognized(folder, text);
    expect(found.layout).toEqual({ kind: 'delimited', skipLines: 3 });
    expect(found.unsure.map(({ code }) => code)).toEqual(['title-lines']);
    expect(log.positions).toMatchObject([{ ...PLACE, row: 5 }]);
    expect(log.rowsRead).toBe(1);
  });

  it('whose title holds names of roles too', async () => {
    const text = file('Point list with height and time', ROLES.join(), CELLS.join(), CELLS.join());
    expect((await readRecognized(folder, text)).found.layout).toEqual({ kind: 'delimited', skipLines: 1 });
  });

  it('below comments with another mark', async () => {
    for (const comment of ['%', '!', '//']) {
      const text = file(`${comment} one`, `${comment} two`, ROLES.join(), CELLS.join(), `${comment} three`);
      const { found, log } = await readRecognized(folder, text);
      expect(found.layout).toEqual({ kind: 'delimited', comment });
      expect([log.rowsRead, log.positions.length]).toEqual([1, 1]);
    }
  });

  it('between blanks', async () => {
    const text = file(ROLES.join('  '), CELLS.join('   '), CELLS.join(' '));
    const { found, log } = await readRecognized(folder, text);
    expect(found.layout).toEqual({ kind: 'delimited' });
    expect(log.positions).toHaveLength(2);
  });

  it('with units behind the names: only these names are stated', async () => {
    const text = file(
      'Name,Lat,Lon,Hgt m,UTC,Fix',
      ['CP1', '47.010000001', '-8.000000001', '500.123', '2025-03-04 09:00:00', 'Fixed'].join(),
    );
    const { found, log } = await readRecognized(folder, text);
    expect(found.layout).toEqual({
      kind: 'delimited',
      columns: { height: 'Hgt m' },
      time: { zone: 'UTC' },
    });
    expect(log.positions[0]).toMatchObject({ ...PLACE, mark: '', pointNumber: 'CP1', utcMs: AT_9 });
  });

  it('in a comment line names the columns by number', async () => {
    const text = file(`% ${ROLES.join(' ')}`, CELLS.join(' '), CELLS.join(' '));
    const { found, log } = await readRecognized(folder, text);
    expect(found.layout).toEqual({
      kind: 'delimited',
      delimiter: 'blanks',
      header: false,
      comment: '%',
      columns: { time: 1, mark: 2, latitude: 3, longitude: 4, height: 5, fix: 6 },
    });
    expect(log.positions[0]).toMatchObject(PLACE);
  });

  it('between blanks with one name above date and time of day', async () => {
    const text = file(
      'Time(UTC)  Mark Latitude Longitude Height Fix',
      '2025/03/14 14:15:00.5 CP1 -35.123456789 149.123456789 612.125 fixed',
    );
    const { found, log } = await readRecognized(folder, text);
    expect(found.layout).toEqual({
      kind: 'delimited',
      delimiter: 'blanks',
      header: false,
      skipLines: 1,
      columns: { date: 1, timeOfDay: 2, mark: 3, latitude: 4, longitude: 5, height: 6, fix: 7 },
      time: { format: 'yyyy/MM/dd HH:mm:ss.SSS', zone: 'UTC' },
    });
    expect(log.positions[0]).toMatchObject({
      latitudeDeg: -35.123456789,
      utcMs: Date.UTC(2025, 2, 14, 14, 15, 0, 500),
    });
  });

  it('with words of another language: cells tell, and names are stated', async () => {
    const text = Buffer.from(
      file(
        'Zeitpunkt;Prüfpunkt;Breite;Länge;Höhe;Lösung',
        '14.03.2025 13:15:00;Mühle;53,010000001;108,000000001;50,125;fixed',
        '14.03.2025 13:15:01;Mühle;53,010000002;108,000000002;50,126;float',
      ),
      'latin1',
    );
    const { found, log } = await readRecognized(folder, text, { timeZone: 'Etc/GMT-1' });
    expect(found.layout).toEqual({
      kind: 'delimited',
      decimal: 'comma',
      encoding: 'latin1',
      columns: {
        time: 'Zeitpunkt',
        mark: 'Prüfpunkt',
        latitude: 'Breite',
        longitude: 'Länge',
        height: 'Höhe',
        fix: 'Lösung',
      },
      time: { format: 'dd.MM.yyyy HH:mm:ss' },
    });
    expect(log.positions[0]).toMatchObject({
      mark: 'Mühle',
      latitudeDeg: 53.010000001,
      longitudeDeg: 108.000000001,
      heightM: 50.125,
      utcMs: Date.UTC(2025, 2, 14, 12, 15),
    });
  });

  it('that lacks a coordinate or spells it wrongly: the column is asked for, not guessed', () => {
    const found = recognized(file(ROLES.join().replace('height', 'heigth'), CELLS.join()));
    expect(found.layout).toEqual({ kind: 'delimited' });
    const [doubt] = found.unsure;
    expect(doubt).toMatchObject({
      code: 'missing-column',
      key: 'layout.columns.height',
      choices: ['heigth'],
      decisive: true,
    });
  });

  it('with two columns of one role asks which, unless one of them is blank', async () => {
    const two = [...ROLES, 'Ellipsoidal height'].join();
    const asked = recognized(file(two, [...CELLS, '547.1'].join()));
    expect(asked.unsure[0]).toMatchObject({
      code: 'repeated-role',
      key: 'layout.columns.height',
      choices: ['height', 'Ellipsoidal height'],
      decisive: true,
    });
    const { found, log } = await readRecognized(folder, file(two, [...CELLS.with(4, ''), '547.1'].join()));
    expect(found.layout).toEqual({ kind: 'delimited', columns: { height: 'Ellipsoidal height' } });
    expect(log.positions[0]!.heightM).toBe(547.1);
  });

  it('takes the first of two numbers of points and says so', () => {
    const found = recognized(file(`ID,Name,${ROLES.join()}`, `1,a,${CELLS.join()}`));
    expect(found.layout).toEqual({ kind: 'delimited', columns: { pointNumber: 'ID' } });
    expect(decisive(found)).toEqual([]);
    expect(found.unsure[0]).toMatchObject({ code: 'repeated-role', decisive: false });
  });
});

describe('decimal commas', () => {
  const commas = CELLS.map((cell) => cell.replace('.', ','));

  it.each([
    [';', {}],
    ['\t', {}],
    [' ', {}],
  ])('between %j', async (delimiter, extra) => {
    const { found, log } = await readRecognized(
      folder,
      file(ROLES.join(delimiter), commas.join(delimiter), commas.join(delimiter)),
    );
    expect(found.layout).toEqual({ kind: 'delimited', decimal: 'comma', ...extra });
    expect(log.positions[1]).toMatchObject(PLACE);
  });

  it('between commas in quotes', async () => {
    const text = file(ROLES.join(), commas.map((cell) => `"${cell}"`).join());
    const { found, log } = await readRecognized(folder, text);
    expect(found.layout).toEqual({ kind: 'delimited', decimal: 'comma' });
    expect(log.positions[0]).toMatchObject(PLACE);
  });

  it('beside decimal points are asked about', () => {
    const mixed = [CELLS[0]!, 'CP1', '47,01', '8,02', '500.1', 'fixed'].join(';');
    const found = recognized(file(ROLES.join(';'), mixed, mixed));
    expect(found.unsure[0]).toMatchObject({ code: 'decimal-mark', key: 'layout.decimal', decisive: true });
    expect(found.layout).not.toHaveProperty('decimal');
  });
});

describe('a column Datum', () => {
  const rows = (datum: string): string =>
    file(
      'Datum;Uhrzeit;mark;latitude;longitude;height;fix',
      `${datum};10:28:11;M06;44,278064588;-18,458611517;685,8064;fixed`,
      `${datum};10:28:12;M06;44,278064601;-18,458611518;685,8076;fixed`,
    );

  it('of dates is the date, and its format and zone are asked for', async () => {
    expect(recognized(rows('13.03.2025')).columns).toMatchObject({ date: 'Datum', timeOfDay: 'Uhrzeit' });
    expect(recognized(rows('13.03.2025')).columns).not.toHaveProperty('frame');
    expect(decisive(recognized(rows('13.03.2025')))).toEqual(['time-zone']);
    expect(decisive(recognized(rows('03.04.2025')))).toEqual(['date-order', 'time-zone']);
    const { log } = await readRecognized(folder, rows('13.03.2025'), { timeZone: 'UTC' });
    expect(log.positions[0]?.utcMs).toBe(Date.UTC(2025, 2, 13, 10, 28, 11));
  });

  it.each(['ETRF2000', '4258', '31467', 'WGS 84'])('of frames such as %s is the frame', (datum) => {
    expect(recognized(rows(datum)).columns).toMatchObject({ frame: 'Datum' });
  });
});

describe('a column of names among other words', () => {
  const rows = (...remarks: readonly string[]): string =>
    file(
      'time,latitude,longitude,height,fix,Trupp,Bemerkung',
      ...remarks.map((remark, k) => `2025-03-04T09:00:0${k}Z,47.01,-8.01,500.1,fixed,C,${remark}`),
    );
  const told = (text: string): string =>
    recognized(text).unsure.find(({ code }) => code === 'unused-columns')?.because ?? '';

  it('is told with the pattern that reads the name out of it', () => {
    const pattern = /pattern: '([^']+)'/.exec(told(rows('KONTR M06', 'KONTR M-04', 'KONTR M01')))?.[1];
    expect(pattern).toBe('^KONTR\\s+(\\S+)$');
    expect(new RegExp(pattern!).exec('KONTR M-04')?.[1]).toBe('M-04');
  });

  it('is told without one where the words differ or no name follows', () => {
    expect(told(rows('KONTR M06', 'HECKE 3', 'ZAUN 2'))).not.toContain('pattern');
    expect(told(rows('M06', 'M04', 'M01'))).not.toContain('pattern');
  });
});
