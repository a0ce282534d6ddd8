import { describe, expect, it } from 'vitest';
import {
  type Control,
  type MarkInterval,
  markAt,
  matchRowNames,
  type NameRules,
  NearestMark,
  readAliases,
  readMarkTimes,
} from '../../src/control/index.js';
import { geocentricToGeodetic, geodeticToGeocentric, localFrame } from '../../src/geodesy/index.js';
import { control, MARKS, mark } from '../errors/world.js';
import { testFolder } from '../files.js';

const folder = testFolder();
const known = control();
const UTC = (time: string): number => Date.parse(`2025-03-04T${time}Z`);

const withNames = (names: Partial<NameRules>): Control => ({
  ...known,
  names: { pattern: null, aliases: new Map(), ...names },
});

/** The mark that a row names, or what is told of it. */
function named(where: Control, row: { mark?: string; pointNumber?: string; description?: string }): string {
  const match = matchRowNames(where, { mark: '', pointNumber: '', description: '', ...row });
  return match.kind === 'known' ? match.point.name : match.detail;
}

describe('a row names a mark', () => {
  it('by its mark column, its point number or its description, in this order', () => {
    expect(named(known, { mark: 'CP1', pointNumber: 'CP2', description: 'CP3' })).toBe('CP1');
    expect(named(known, { pointNumber: 'CP2', description: 'CP3' })).toBe('CP2');
    expect(named(known, { pointNumber: '1023', description: 'CP3' })).toBe('CP3');
    expect(named(known, { mark: 'unknown', pointNumber: '1023', description: 'CP3' })).toBe('CP3');
  });

  it('by exactly its name: case and zeros count, near misses are asked about', () => {
    expect(named(known, { mark: 'cp1' })).toBe('no mark is named "cp1" (did you mean "CP1"?)');
    expect(named(known, { mark: 'CP-1' })).toBe('no mark is named "CP-1" (did you mean "CP1"?)');
    expect(named(known, { mark: 'CP01' })).toBe('no mark is named "CP01" (did you mean "CP1"?)');
    expect(named(known, { mark: 'fence' })).toBe('no mark is named "fence"');
    expect(named(known, {})).toBe('the row names no mark');
  });
});

describe('a pattern', () => {
  it('that cuts a name short is told with the text as written and the mark that was near', () => {
    expect(named(withNames({ pattern: /KONTR (\w+)/ }), { description: 'KONTR CP-02' })).toBe(
      'no mark is named "CP", which the pattern under marks.names reads out of "KONTR CP-02" (did you mean "CP2"?)',
    );
  });

  const checks = withNames({ pattern: /^(?:CHK\s+)?(CP\d+)(?:-\d+)?$/ });

  it('finds the mark in point numbers and descriptions by its first group', () => {
    expect(named(checks, { description: 'CHK CP2' })).toBe('CP2');
    expect(named(checks, { pointNumber: 'CP2-2', description: 'windy' })).toBe('CP2');
    expect(named(checks, { pointNumber: '17', description: 'CHK  CP3-11' })).toBe('CP3');
    expect(named(withNames({ pattern: /CHK (.*)/ }), { description: 'CHK  CP2 ' })).toBe('CP2');
  });

  it('is asked after names that stand as they are', () => {
    // "CHK CP1" would be CP1 by the pattern, but the description is the name of a mark as it stands.
    expect(named(checks, { pointNumber: 'CHK CP1', description: 'CP2' })).toBe('CP2');
  });

  it('tells of the name that it found and of the whole text', () => {
    expect(named(checks, { description: 'CHK CP4' })).toBe(
      'no mark is named "CP4", which the pattern under marks.names reads out of "CHK CP4" (did you mean "CP1"?)',
    );
    expect(named(checks, { pointNumber: '1023', description: 'TREE' })).toBe('no mark is named "1023"');
  });

  it('whose group takes no part finds nothing', () => {
    expect(named(withNames({ pattern: /X|(CP\d)/ }), { description: 'X' })).toBe('no mark is named "X"');
  });
});

describe('aliases', () => {
  it('are other names, of whole texts and of what the pattern finds', () => {
    const names = withNames({
      pattern: /^CHK (.+)$/,
      aliases: new Map([
        ['Harbour pillar', 'CP1'],
        ['7', 'CP2'],
      ]),
    });
    expect(named(names, { mark: 'Harbour pillar' })).toBe('CP1');
    expect(named(names, { description: 'CHK 7' })).toBe('CP2');
    expect(named(names, { description: 'CHK Harbour pillar' })).toBe('CP1');
    // A mark of that name goes before an alias of another.
    expect(named(withNames({ aliases: new Map([['CP1', 'CP2']]) }), { mark: 'CP1' })).toBe('CP1');
  });

  const read = (text: string) => readAliases(folder.write('aliases.csv', text), 'aliases.csv', known.marks);

  it('are read from a file', async () => {
    const aliases = await read('alias,mark\nHarbour pillar,CP1\n007,CP2\n007,CP2\n');
    expect([...aliases]).toEqual([
      ['Harbour pillar', 'CP1'],
      ['007', 'CP2'],
    ]);
  });

  it('tell every faulty row at once', async () => {
    await expect(read('alias,mark\nA,CP9\nB,CP1\nB,CP2\n,CP1\nC\n')).rejects.toThrow(
      [
        'aliases.csv:2 error: Expected a mark of the marks file, came "CP9". Correct the name.',
        'aliases.csv:4 error: "B" is already another name of "CP1". Keep one of the two.',
        'aliases.csv:5 error: Expected another name of a mark, came a blank cell. Fill it in.',
        'aliases.csv:6 error: The row cannot be read: expected 2 cells as in the header, came 1. Correct it.',
      ].join('\n'),
    );
  });
});

describe('a list of stays', () => {
  const stay = (name: string, from: string, to: string, rover = ''): MarkInterval => ({
    mark: name,
    rover,
    fromMs: UTC(from),
    toMs: UTC(to),
  });

  it('has a rover on a mark from the first to the last moment of a stay', () => {
    const times = [stay('CP1', '09:00:00', '09:01:00'), stay('CP2', '09:05:00', '09:06:00')];
    const at = (time: string) => markAt(times, UTC(time), 'R1');
    expect(at('08:59:59.999')).toBe(null);
    expect(at('09:00:00')).toBe('CP1');
    expect(at('09:01:00')).toBe('CP1');
    expect(at('09:01:00.001')).toBe(null);
    expect(at('09:05:30')).toBe('CP2');
    expect(at('09:06:01')).toBe(null);
    expect(markAt([], UTC('09:00:00'), 'R1')).toBe(null);
  });

  it('holds for its rover alone where it names one', () => {
    const times = [stay('CP1', '09:00:00', '09:10:00', 'R1'), stay('CP2', '09:02:00', '09:08:00', 'R2')];
    expect(markAt(times, UTC('09:05:00'), 'R1')).toBe('CP1');
    expect(markAt(times, UTC('09:05:00'), 'R2')).toBe('CP2');
    expect(markAt(times, UTC('09:05:00'), 'R3')).toBe(null);
    expect(markAt(times, UTC('09:09:00'), 'R2')).toBe(null);
  });

  it('of two that overlap takes the one that began last', () => {
    const times = [stay('CP1', '09:00:00', '09:10:00'), stay('CP2', '09:04:00', '09:06:00')];
    expect(['09:03:00', '09:05:00', '09:07:00'].map((time) => markAt(times, UTC(time), ''))).toEqual([
      'CP1',
      'CP2',
      'CP1',
    ]);
  });

  const read = (text: string, timeZone: string | null = null) =>
    readMarkTimes(folder.write('stays.csv', text), 'stays.csv', known.marks, timeZone);

  it('is read from a file, in any order, times in the zone of the study', async () => {
    const times = await read(
      'mark;from;to;rover\nCP2;2025-03-04 11:00;2025-03-04 11:05;R2\nCP1;2025-03-04T09:00:00Z;2025-03-04T09:01:00Z;\n',
      'Europe/Paris',
    );
    expect(times).toEqual([stay('CP1', '09:00:00', '09:01:00'), stay('CP2', '10:00:00', '10:05:00', 'R2')]);
  });

  it('tells every faulty row at once', async () => {
    const [a, b] = ['2025-03-04T09:00:00Z', '2025-03-04T09:01:00Z'];
    await expect(
      read(
        `mark,start,end\nCP9,${a},${b}\nCP1,${b},${a}\nCP1,2025-03-04,${b}\nCP1,${a},noon\nCP1,09:00,${b}\n`,
      ),
    ).rejects.toThrow(
      [
        'stays.csv:2 error: Expected a mark of the marks file, came "CP9". Correct the name.',
        `stays.csv:3 error: Expected an end after the start, came "${b}" to "${a}". Correct the row.`,
        'stays.csv:4 error: The stay has no times: expected a time of day, came a date alone. Correct the row.',
        'stays.csv:5 error: The stay has no times: expected a time like 2025-03-01T10:15:00Z, came "noon". Correct the row.',
        'stays.csv:6 error: The stay has no times: expected a time like 2025-03-01T10:15:00Z, came "09:00". Correct the row.',
      ].join('\n'),
    );
  });
});

describe('the nearest mark', () => {
  const [name, place] = ['CP1', MARKS.CP1!] as const;
  /** A place so many metres east of CP1 on the ellipsoid, as a position with height 0. */
  const east = (eastM: number) =>
    localFrame({ ...place, heightM: 0 }).toGeocentric({ eastM, northM: 0, upM: 0 });
  const beside = mark('CP1b', { ...geocentricToGeodetic(east(4)), heightM: 100 });

  it('is the nearer of two within reach, whatever their heights', () => {
    const nearest = new NearestMark(new Map([...known.marks, ['CP1b', beside]]));
    expect(nearest.find(east(1.9), 3)?.name).toBe(name);
    expect(nearest.find(east(2.1), 3)?.name).toBe('CP1b');
    expect(nearest.find(east(-2.99), 3)?.name).toBe(name);
    expect(nearest.find(east(6.99), 3)?.name).toBe('CP1b');
  });

  it('is none where none is within reach', () => {
    const nearest = new NearestMark(known.marks);
    expect(nearest.find(east(3.01), 3)).toBe(null);
    expect(new NearestMark(new Map()).find(east(0), 3)).toBe(null);
  });

  it('is never a mark that is not known in plan', () => {
    const heightOnly = mark('BM', { latitudeDeg: Number.NaN, longitudeDeg: Number.NaN, heightM: 500 });
    const nearest = new NearestMark(new Map([['BM', heightOnly]]));
    expect(nearest.find(geodeticToGeocentric(place), 1e9)).toBe(null);
  });
});
