import { describe, expect, it } from 'vitest';
import {
  type AutoLayout,
  autoLayout,
  formatMessage,
  InputError,
  type Message,
  type RecognizeOptions,
} from '../../src/logs/index.js';
import { testFolder } from '../files.js';
import { file } from './heads.js';

const folder = testFolder();
const HEADER = 'time,mark,latitude,longitude,height,fix';
const ROW = '2025-03-04T09:00:00Z,CP1,47.010000001,-8.000000001,500.123,fixed';
const PLAIN: AutoLayout = { layout: { kind: 'delimited' }, messages: [] };

const auto = (
  content: string | Uint8Array,
  options?: RecognizeOptions,
  name = 'log.csv',
): Promise<AutoLayout> => autoLayout(folder.write(name, content), name, options);

async function refused(
  content: string | Uint8Array,
  options?: RecognizeOptions,
): Promise<readonly Message[]> {
  try {
    await auto(content, options);
  } catch (error) {
    if (error instanceof InputError) return error.messages;
    throw error;
  }
  throw new Error('it was read');
}

describe('a log without a layout', () => {
  it.each<[string, string | Uint8Array]>([
    ['spells everything', file(HEADER, ROW)],
    ['between semicolons', file(HEADER, ROW).replaceAll(',', ';')],
    ['in UTF-16', Buffer.from(`\ufeff${file(HEADER, ROW)}`, 'utf16le')],
    ['is empty', ''],
    ['is a header alone', file(HEADER)],
    // The reader of rows tells these row by row, with the same keys.
    ['has times without a zone', file(HEADER, ROW.replace('Z', ''))],
    ['has codes of the fix', file(HEADER, ROW.replace('fixed', '4'))],
    ['lacks a column', file(HEADER.replace('height', 'heigth'), ROW)],
    ['has nothing but damaged rows', file(HEADER, ROW.replace('47.', 'x'))],
    ['has two columns of a role', file(`${HEADER},Height (m)`, `${ROW},1`)],
  ])('that %s is read as ever, without a message', async (_, content) => {
    expect(await auto(content)).toEqual(PLAIN);
  });

  it('that is understood otherwise comes with one message that says how', async () => {
    const content = Buffer.from(
      file(
        'Harbour',
        'Zeit;Punkt;Breite;Länge;Höhe;Art',
        '13.03.2025 14:15:00;Mühle;147,010000001;47,000000001;50,125;fixed',
      ),
      'latin1',
    );
    const { layout, messages } = await auto(content, { timeZone: 'Etc/GMT-1' });
    expect(layout).toMatchObject({ kind: 'delimited', skipLines: 1, decimal: 'comma', encoding: 'latin1' });
    expect(messages.map(formatMessage)).toEqual([
      'log.csv info: The layout of this log was recognised as cells between the delimiters of its header, decimal commas, 1 line passed over, letters in latin1, time in "Zeit", mark in "Punkt", longitude in "Breite", latitude in "Länge", height in "Höhe", fix in "Art", times "dd.MM.yyyy HH:mm:ss"; run "ppmwise layout" with this file to check it.',
    ]);
    expect(messages[0]!.code).toBe('layout-recognized');
  });

  it('in other coordinates than the study states them', async () => {
    const geocentric = file(
      'time,mark,x,y,z,fix',
      '2025-03-14T10:00:00Z,M1,4517590.879,0.000,4487348.409,fixed',
    );
    const { layout, messages } = await auto(geocentric);
    expect(layout).toEqual({ kind: 'delimited', coordinates: 'geocentric' });
    expect(messages[0]!.text).toContain('coordinates geocentric');
    expect(await auto(geocentric, { coordinates: 'geocentric' })).toEqual(PLAIN);
    const plane = { coordinates: '+proj=utm +zone=33 +ellps=WGS84' };
    expect((await auto(file(HEADER, ROW), plane)).layout).toEqual({
      kind: 'delimited',
      coordinates: 'geographic',
    });
    const utm = file(
      'time,mark,easting,northing,height,fix',
      '2025-03-14T10:00:00Z,M1,500000.0,4982950.4,100.0,fixed',
    );
    expect(await auto(utm, plane)).toEqual(PLAIN);
  });

  it('that leaves something open is refused with each question, its reason and its key', async () => {
    const messages = await refused(file('1,4982950.4,500000.0,135.1,CHK M03'));
    expect(messages.map(({ code }) => code).sort()).toEqual([
      'mark-column',
      'no-date',
      'northing-easting-order',
      'projection',
    ]);
    expect(messages.map(formatMessage)).toContain(
      'log.csv error: Which of column 2 and column 3 is the northing? The first row has 4982950.4 and 500000.0: nothing in the file tells the order. State "layout.columns" in the study file as {easting: 3, northing: 2} or {easting: 2, northing: 3}; "ppmwise layout" prints a layout of this file to begin with.',
    );
    for (const { severity, text, file: place } of messages) {
      expect([severity, place]).toEqual(['error', 'log.csv']);
      expect(text).toMatch(/^\p{Lu}.*\? .*\. State "[a-zA-Z.]+" in the study file.*\.$/u);
      expect(text.length).toBeLessThanOrEqual(600);
    }
  });

  it('that is no log is left to the reader, with what the reader does not know to say', async () => {
    const spreadsheet = await auto('PK\u0003\u0004');
    expect(spreadsheet.layout).toEqual({ kind: 'delimited' });
    expect(spreadsheet.messages[0]!.text).toContain('CSV');
    expect(await auto('hello\n')).toEqual({ layout: { kind: 'delimited' }, messages: [] });
  });

  it.each<[string, string]>([
    ['height-kind', file(HEADER.replace('height', 'Elevation'), ROW)],
    ['height-of', file(`${HEADER},Rod height`, `${ROW},2.000`)],
    ['date-order', file(HEADER, ROW.replace('2025-03-04T09:00:00Z', '01/02/2025 10:15'))],
    ['mark-column', file(HEADER.replace('mark', 'point,code'), ROW.replace('CP1', '1,CP1'))],
  ])('is refused for %s', async (code, content) => {
    expect((await refused(content, { timeZone: 'UTC' })).map((told) => told.code)).toEqual([code]);
  });
});
