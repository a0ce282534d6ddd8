import { describe, expect, it } from 'vitest';
import { formatMessage, RowMessages, type RowReason, type SetAsideRow } from '../../src/logs/index.js';

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
