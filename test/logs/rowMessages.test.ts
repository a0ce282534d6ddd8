import { describe, expect, it } from 'vitest';
import { parse } from 'yaml';
import { formatMessage, RowMessages, type RowReason, type SetAsideRow } from '../../src/logs/index.js';
import { timeReader } from '../../src/time/index.js';

const row = (
  file: string,
  line: number,
  reason: RowReason,
  detail: string,
  column: string | null = null,
): SetAsideRow => ({ file, row: line, reason, column, detail });

function told(rows: readonly SetAsideRow[]): string[] {
  const messages = new RowMessages();
  for (const each of rows) messages.add(each);
  return messages.messages().map(formatMessage);
}

describe('RowMessages', () => {
  it('tells of an unknown name once over all files, at its first place', () => {
    const detail = 'no mark is named "CP-5" (did you mean "CP5"?)';
    const rows = [
      row('b.csv', 3, 'unknown-mark', detail),
      row('a.csv', 9, 'unknown-mark', detail),
      row('a.csv', 7, 'unknown-mark', detail),
      row('c.csv', 2, 'unknown-base', 'no base is named "B9"'),
    ];
    const expected = [
      'a.csv:7 warning: 3 rows are set aside as unknown-mark, in 2 files: no mark is named "CP-5" (did you mean "CP5"?). Add the mark to the marks file or correct the name.',
      'c.csv:2 warning: 1 row is set aside as unknown-base: no base is named "B9". Add the base to the bases file or correct the name.',
    ];
    expect(told(rows)).toEqual(expected);
    expect(told([...rows].reverse())).toEqual(expected);
  });

  it.each([
    ['03.13.2025 10:28:11', 'time: {format: MM.dd.yyyy HH:mm:ss}'],
    ['13.03.2025 10:28:11', 'time: {format: dd.MM.yyyy HH:mm:ss}'],
    ['13/03/2025, 10:28', "time: {format: 'dd/MM/yyyy, HH:mm'}"],
  ])('says which line of the layout reads a time like %s', (text, line) => {
    const read = timeReader({}, 'UTC')(text);
    if (read.kind !== 'invalid') throw new Error('read by the default format');
    expect(told([row('a.csv', 2, 'unreadable', read.detail, 'Datum')])).toEqual([
      `a.csv:2 [Datum] warning: 1 row is set aside as unreadable: expected a time like 2025-03-01T10:15:00Z, came ${JSON.stringify(text)}. If all times are written so, add "${line}" to the layout of these logs.`,
    ]);
    const { format } = (parse(line) as { time: { format: string } }).time;
    expect(timeReader({ format }, 'UTC')(text).kind).toBe('instant');
  });

  it('offers both orders of day and month where a time does not tell, and none where it is no time', () => {
    const remedy = (came: string): string =>
      told([row('a.csv', 2, 'unreadable', `expected a time like 2025-03-01T10:15:00Z, came "${came}"`)])[0]!;
    expect(remedy('03.04.2025 10:28')).toMatch(
      /add "time: \{format: dd\.MM\.yyyy HH:mm\}" or "time: \{format: MM\.dd\.yyyy HH:mm\}", whichever is meant, to/,
    );
    expect(remedy('soon')).toMatch(/came "soon"\. Correct the rows or export them again\.$/);
  });

  it('says that the layout states decimal commas', () => {
    expect(
      told([row('a.csv', 2, 'unreadable', 'expected a number, came "1,5" with a decimal comma')])[0],
    ).toMatch(
      /with a decimal comma\. If all numbers are written so, add "decimal: comma" to the layout of these logs\.$/,
    );
  });

  it('says what to do about rows that name no base where there are several', () => {
    expect(told([row('a.csv', 2, 'unknown-base', 'the row names no base and the study has 2')])).toEqual([
      'a.csv:2 warning: 1 row is set aside as unknown-base: the row names no base and the study has 2. State it as "constants: {base: NAME}" in the layout of these logs, or leave only the base that was used in the bases file.',
    ]);
  });

  it('tells of unreadable values once a file and column, by the first of them', () => {
    const rows = [
      row('a.csv', 5, 'unreadable', 'expected a number, came "b"', 'height'),
      row('a.csv', 4, 'unreadable', 'expected a number, came "a"', 'height'),
      row('b.csv', 4, 'unreadable', 'expected a number, came "c"', 'height'),
      row('a.csv', 8, 'unreadable', 'expected 12 cells as in the header, came 7'),
      row('a.csv', 9, 'unreadable', 'expected 12 cells as in the header, came 8'),
    ];
    expect(told(rows)).toEqual([
      'a.csv:4 [height] warning: 2 rows are set aside as unreadable: expected a number, came "a". Correct the rows or export them again.',
      'a.csv:8 warning: 2 rows are set aside as unreadable: expected 12 cells as in the header, came 7. Correct the rows or export them again.',
      'b.csv:4 [height] warning: 1 row is set aside as unreadable: expected a number, came "c". Correct the rows or export them again.',
    ]);
  });

  it('says nothing of reasons that speak for themselves', () => {
    const silent: RowReason[] = ['not-fixed', 'no-position', 'duplicate', 'outside-study'];
    expect(told(silent.map((reason) => row('a.csv', 2, reason, 'x')))).toEqual([]);
  });

  it('tells of thousands of names in short, likely misspellings first', () => {
    const points = Array.from({ length: 5000 }, (_, k) =>
      row('a.csv', k + 2, 'unknown-mark', `no mark is named "${k}"`),
    );
    const near = row('a.csv', 9000, 'unknown-mark', 'no mark is named "CP-5" (did you mean "CP5"?)');
    const messages = told([...points, near, { ...points[0]!, file: 'b.csv' }]);
    expect(messages).toHaveLength(5);
    expect(messages[0]).toContain('"CP-5"');
    expect(messages[1]).toContain('no mark is named "0"');
    expect(messages.at(-1)).toBe(
      'a.csv:5 warning: 4997 rows are set aside as unknown-mark for 4997 further names: here no mark is named "3". Nothing is wrong where these are ordinary points and no check shots. Where the mark stands in another column, give that column the role "description" in the layout, and a "pattern" in marks.names where more than the name stands there.',
    );
  });
});
