import { parse } from 'csv-parse/sync';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { splitCells } from '../../src/logs/cells.js';

describe('splitCells', () => {
  it.each<[string, string, string[] | null]>([
    ['a,b,c', ',', ['a', 'b', 'c']],
    [' a ,\tb , ', ',', ['a', 'b', '']],
    ['', ',', ['']],
    [',,', ',', ['', '', '']],
    ['a||b', '||', ['a', 'b']],
    ['"a,b",c', ',', ['a,b', 'c']],
    ['"say ""yes""",c', ',', ['say "yes"', 'c']],
    [' "a" , "b" ', ',', ['a', 'b']],
    ['" a ","  "', ',', ['a', '']],
    ['5" rod,c', ',', ['5" rod', 'c']],
    ['"a"\t\t"b"', '\t', ['a', '', 'b']],
    ['\t"b"\t', '\t', ['', 'b', '']],
    ['"a', ',', null],
    ['b,"a', ',', null],
    ['"a"x,b', ',', null],
    ['"a""', ',', null],
  ])('%j by %j', (line, delimiter, cells) => {
    expect(splitCells(line, delimiter)).toEqual(cells);
  });

  // Oracle: csv-parse 7.0.3, a published reader of delimited text.
  it('agrees with csv-parse', () => {
    const cell = fc.string({ unit: fc.constantFrom('a', '"', '5', ' ', ';', 'é', '.'), maxLength: 6 });
    const written = fc.tuple(cell, fc.boolean()).map(([text, quote]) => {
      // An unquoted cell that begins with a quote is no plain cell.
      const plain = !quote && !text.trim().startsWith('"') && !text.includes(';');
      return { text: text.trim(), line: plain ? text : `"${text.replaceAll('"', '""')}"` };
    });
    fc.assert(
      fc.property(fc.array(written, { minLength: 1, maxLength: 6 }), (cells) => {
        const line = cells.map((each) => each.line).join(';');
        const [expected] = parse(line, { delimiter: ';', relax_quotes: true, trim: true }) as string[][];
        expect(splitCells(line, ';')).toEqual(cells.map(({ text }) => text));
        if (expected !== undefined) {
          expect(splitCells(line, ';')).toEqual(expected.map((text) => text.trim()));
        }
      }),
      { seed: 11, numRuns: 2000 },
    );
  });
});
