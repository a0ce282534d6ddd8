import { describe, expect, it } from 'vitest';
import { parse } from 'yaml';
import { type LogLayout, layoutYaml, recognitionText } from '../../src/logs/index.js';
import { file, recognize, recognized } from './heads.js';

interface Entry {
  readonly files: string;
  readonly coordinates: string | null;
  readonly layout: LogLayout;
}

const entryOf = (yaml: string): Entry => (parse(yaml) as { logs: [Entry] }).logs[0];

describe('layoutYaml', () => {
  it('of a complete layout reads back as the layout', () => {
    const texts = [
      file('time,mark,latitude,longitude,height,fix', '2025-03-04T09:00:00Z,CP1,47.0,8.0,500.0,fixed'),
      file(
        'Title: a # b',
        'Zeit;Ort;"Br;eite";Weite;Höhe',
        '13.03.2025 14:15:00;A;147,000000001;47,000000001;5,5',
      ),
      file(
        '% x',
        '2357 18000.0 CP1 -147.010000001 -47.010000001 500.0',
        '2357 18001.0 CP1 -147.01 -47.01 500.1',
      ),
      file('20250314 141500 CP1 147.010000001 47.010000001 500.0'),
    ];
    for (const text of texts) {
      const found = recognized(text, { timeZone: 'UTC' }, 'logs/a b.csv');
      expect(found.complete).toBe(true);
      const { files, coordinates, layout } = entryOf(layoutYaml(found));
      expect({ files, coordinates, layout }).toEqual({
        files: 'logs/a b.csv',
        coordinates: 'geographic',
        layout: { ...found.layout, columns: found.columns },
      });
    }
  });

  it('leaves every key that must be stated without a value, with its question above it', () => {
    const found = recognized(
      file('1,1234567.123,2345678.456,312.45,CHK', '2,1234568.1,2345679.4,313.45,CHK2'),
    );
    expect(layoutYaml(found)).toContain(
      [
        '        # TO STATE (layout.columns.mark): Which column names the mark that was measured? The first row has "1"',
        '        # in column 1 and "CHK" in column 5; a pattern under marks.names reads a name out of a longer text.',
        '        # State 1 or 5.',
        '        mark:',
        '      units:',
      ].join('\n'),
    );
    const { coordinates, layout } = entryOf(layoutYaml(found));
    expect(coordinates).toBe(null);
    expect(layout).toMatchObject({
      columns: { mark: null },
      units: { length: null },
      constants: { date: null },
    });
  });
});

describe('recognitionText', () => {
  it('shows the layout, the first rows in columns, and what to state', () => {
    const text = file(
      'Date,Time,Point,Latitude,Longitude,Height (m),Fix',
      '03/14/2025,2:15:00 PM,M1,47.0100001,8.1230001,512.3,4',
      '03/14/2025,2:16:00 PM,M2,47.0100002,8.1230002,512.3,5',
    );
    const shown = recognitionText(recognize(text, { timeZone: 'UTC' }), 'log.csv');
    expect(shown).toBe(`log.csv: 1 thing must be stated.

logs:
  - files: log.csv
    coordinates: geographic
    layout:
      kind: delimited
      columns:
        date: Date
        timeOfDay: Time
        pointNumber: Point
        latitude: Latitude
        longitude: Longitude
        height: Height (m)
        fix: Fix
      time:
        format: MM/dd/yyyy hh:mm:ss a
      # TO STATE (layout.fixValues): Which texts in column "Fix" mean fixed, float or other? Only "fixed"
      # and "float" are understood, and there are "4", "5". State fixed or float or other.
      fixValues:

The first rows as understood (times in UTC, degrees, heights in metres):
  line  time read                 latitude read  longitude read  height read  date        timeOfDay   pointNumber  latitude    longitude  height  fix
  2     2025-03-14T14:15:00.000Z  47.01000010    8.12300010      512.300      03/14/2025  2:15:00 PM  M1           47.0100001  8.1230001  512.3   4
  3     2025-03-14T14:16:00.000Z  47.01000020    8.12300020      512.300      03/14/2025  2:16:00 PM  M2           47.0100002  8.1230002  512.3   5

To be stated:
  Which texts in column "Fix" mean fixed, float or other? Only "fixed" and "float" are understood, and there are "4", "5".
    layout.fixValues: fixed or float or other
`);
  });

  it('holds no control characters, wherever they stood', () => {
    const text = file(
      '\u001b[31mJob',
      'time,mark\u0007x,latitude,longitude,height',
      ...Array.from({ length: 9 }, () => '2025-03-04T09:00:00Z,C\u001b[2JP,47.0,8.0,500.0'),
    );
    // biome-ignore lint/suspicious/noControlCharactersInRegex: these are the ones that must not be there
    expect(recognitionText(recognize(text), 'log.csv')).not.toMatch(/[\u0000-\u0009\u000b-\u001f]/);
  });

  it('lists a column that its name alone gives a role, so that a wrong role is seen', () => {
    const { layout, columns } = recognized(
      file(
        'time,mark,latitude,longitude,height,fix,pdop',
        '2025-03-04T09:00:00Z,CP1,47.0,8.0,500.0,fixed,1.4',
      ),
    );
    expect(layout).toEqual({ kind: 'delimited' });
    expect(columns).toMatchObject({ time: 'time', fix: 'fix', pdop: 'pdop' });
  });

  it('of a file that is no log is its message', () => {
    expect(recognitionText(recognize(''), 'log.csv')).toBe(
      'log.csv error: Expected a header and positions, came an empty file. Export it again.\n',
    );
  });
});
