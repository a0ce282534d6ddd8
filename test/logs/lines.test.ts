import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { LONGEST_LINE, readLines } from '../../src/logs/lines.js';
import { testFolder } from '../files.js';

const folder = testFolder();

async function lines(content: string | Uint8Array, chunkBytes?: number): Promise<string[]> {
  const found: string[] = [];
  let next = 1;
  for await (const batch of readLines(folder.write('lines.txt', content), chunkBytes)) {
    expect(batch.firstLine).toBe(next);
    next += batch.lines.length;
    found.push(...batch.lines);
  }
  return found;
}

describe('readLines', () => {
  it('ends lines at LF, CRLF and CR, alone and mixed', async () => {
    expect(await lines('a\nb\nc')).toEqual(['a', 'b', 'c']);
    expect(await lines('a\r\nb\r\nc\r\n')).toEqual(['a', 'b', 'c']);
    expect(await lines('a\rb\rc\r')).toEqual(['a', 'b', 'c']);
    expect(await lines('a\r\n\nb\r\rc\n\r')).toEqual(['a', '', 'b', '', 'c', '']);
  });

  it('has no lines in an empty file and one in a file of one line break', async () => {
    expect(await lines('')).toEqual([]);
    expect(await lines('\n')).toEqual(['']);
  });

  it('drops a byte-order mark', async () => {
    expect(await lines('\ufefftime,mark\n')).toEqual(['time,mark']);
    for (const size of [1, 2, 3, 4]) expect(await lines('\ufeffa\nb', size)).toEqual(['a', 'b']);
  });

  it('does not depend on where chunks end, in CRLF or inside a character', async () => {
    const text = fc.string({
      unit: fc.constantFrom('a', '\r', '\n', 'é', '測', '🛰', ','),
      minLength: 0,
      maxLength: 40,
    });
    await fc.assert(
      fc.asyncProperty(text, fc.integer({ min: 1, max: 7 }), async (content, size) => {
        const expected = content.split(/\r\n|\n|\r/);
        if (expected.at(-1) === '') expected.pop();
        expect(await lines(content, size)).toEqual(expected);
      }),
      { seed: 13, numRuns: 300 },
    );
  });

  it('turns bytes that are not UTF-8 into replacement characters, also when cut off at the end', async () => {
    expect(await lines(Uint8Array.of(0x4d, 0xfc, 0x6c, 0x0a, 0x61, 0xc3))).toEqual(['M\ufffdl', 'a\ufffd']);
  });

  it('cuts a line of millions of characters, counts it as one and reads on', async () => {
    const long = 'x'.repeat(3 * LONGEST_LINE);
    const found = await lines(`a\n${long}\nb\r\n${long}`);
    expect(found.map((line) => line.length)).toEqual([1, LONGEST_LINE + 1, 1, LONGEST_LINE + 1]);
  });
});
