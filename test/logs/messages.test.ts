import { describe, expect, it } from 'vitest';
import { formatMessage, InputError, inputError, message, quoted } from '../../src/logs/index.js';
import { quotedList } from '../../src/logs/messages.js';

describe('formatMessage', () => {
  it('puts file, row and column in front', () => {
    const text = 'Expected a number, came "x". Correct it.';
    const format = (place: object) => formatMessage(message('error', 'x', text, place));
    expect(format({})).toBe(`error: ${text}`);
    expect(format({ file: 'a.csv' })).toBe(`a.csv error: ${text}`);
    expect(format({ file: 'a.csv', row: 3 })).toBe(`a.csv:3 error: ${text}`);
    expect(format({ file: 'a.csv', row: 3, column: 'height' })).toBe(`a.csv:3 [height] error: ${text}`);
    expect(format({ column: 'height' })).toBe(`[height] error: ${text}`);
  });

  it('lets no control character of a log reach a terminal', () => {
    const told = formatMessage(message('info', 'x', 'A.', { column: '\u001b[2Jclear\nline' }));
    expect(told).toBe('[\ufffd[2Jclear\ufffdline] info: A.');
  });
});

describe('InputError', () => {
  it('carries its messages and shows them', () => {
    const error = inputError('empty-file', 'Expected rows, came none. Fill it in.', { file: 'a.csv' });
    expect(error).toBeInstanceOf(InputError);
    expect(error.message).toBe('a.csv error: Expected rows, came none. Fill it in.');
    expect(error.messages[0]).toEqual({
      code: 'empty-file',
      severity: 'error',
      text: 'Expected rows, came none. Fill it in.',
      file: 'a.csv',
      row: null,
      column: null,
    });
  });
});

describe('texts as they came', () => {
  it('stand in quotes, long ones cut', () => {
    expect(quoted('a "b"\n')).toBe('"a \\"b\\"\\n"');
    expect(quoted('x'.repeat(61))).toBe(`"${'x'.repeat(60)}"…`);
    expect(quotedList(['a', 'b'])).toBe('"a", "b"');
    expect(quotedList(Array.from({ length: 25 }, () => 'a'))).toMatch(/"a" and 5 more$/);
  });
});
