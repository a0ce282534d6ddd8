import { parse } from 'csv-parse/sync';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { ByteCells } from '../../src/logs/byteCells.js';
import { detectEncoding, forEachLine, readLineChunks } from '../../src/logs/byteChunks.js';
import { splitCells } from '../../src/logs/cells.js';
import { TextCells } from '../../src/logs/rowCells.js';
import { readText, testFolder } from '../files.js';

const folder = testFolder();
const SEED = 4711;

/** Numbers of every writing, and what is none. */
const number = fc.oneof(
  fc.double({ noNaN: true }).map(String),
  fc.integer().map(String),
  fc.double({ min: -180, max: 180, noNaN: true }).map((value) => value.toFixed(9)),
  fc
    .tuple(
      fc.constantFrom('', '-', '+', '--', '+-', '−'),
      fc.string({ unit: fc.constantFrom('0', '0', '1', '9', '5'), maxLength: 24 }),
      fc.constantFrom('', '.', ',', '..'),
      fc.string({ unit: fc.constantFrom('0', '0', '3', '7'), maxLength: 24 }),
      fc.constantFrom('', '', '', 'e5', 'E-3', 'e+22', 'e', 'e400'),
    )
    .map((parts) => parts.join('')),
  fc.constantFrom(
    'Infinity',
    '-Infinity',
    'NaN',
    '0x1F',
    '-0x1F',
    '0b1',
    '0o7',
    '1_000',
    '1 000',
    '١٢',
    '12n',
    '.',
    '-.',
  ),
);
const blank = fc.constantFrom('', ' ', '  ', '\t', '\u00a0', ' \u00a0', '\ufeff', '\u2003', '\u3000');
const text = fc.oneof(
  fc.string({ unit: 'grapheme', maxLength: 8 }),
  fc.constantFrom('CP1', 'fixed', '測点', 'Côte', '🛰', "5' rod", '\u00a0', 'ﬁx'),
);
const cell = fc.tuple(blank, fc.oneof(number, number, text), blank).map((parts) => parts.join(''));

describe('ByteCells', () => {
  it('gives the cells that the text of a line gives', () => {
    fc.assert(
      fc.property(
        fc.array(cell, { minLength: 1, maxLength: 9 }),
        fc.constantFrom(',', ';', '|', '\t'),
        fc.integer({ min: 1, max: 9 }),
        fc.nat(5),
        (cells, delimiter, width, offset) => {
          const line = cells.join(delimiter);
          const bytes = Buffer.from(`${'#'.repeat(offset)}${line}\n`);
          const fast = new ByteCells(delimiter.charCodeAt(0), width);
          const count = fast.split(bytes, offset, bytes.length - 1);
          // Quotes and control characters are for the general reader.
          // biome-ignore lint/suspicious/noControlCharactersInRegex: these are the ones that make a line not plain
          const plain = !/["\u0000-\u0008\u000a-\u001f]/.test(line);
          const expected = line.split(delimiter);
          if (!plain || expected.length > width) {
            expect(count).toBe(-1);
            return;
          }
          expect(splitCells(line, delimiter)).toHaveLength(expected.length);
          expect(count).toBe(expected.length);
          const slow = new TextCells(splitCells(line, delimiter)!);
          for (let k = -1; k <= count; k++) {
            expect(fast.text(k)).toBe(slow.text(k));
            expect(fast.uniqueText(k)).toBe(slow.uniqueText(k));
            expect(fast.number(k)).toBe(slow.number(k));
          }
        },
      ),
      { seed: SEED, numRuns: 20_000 },
    );
  });

  it('keeps no cell of the line before', () => {
    const cells = new ByteCells(44, 3);
    const [long, short] = [Buffer.from('1,22,333'), Buffer.from('4')];
    expect(cells.split(long, 0, long.length)).toBe(3);
    expect(cells.split(short, 0, short.length)).toBe(1);
    expect([cells.text(0), cells.text(1), cells.number(2)]).toEqual(['4', '', Number.NaN]);
  });

  it('tells texts of equal hash and length apart', () => {
    // 31 · 65 + 97 = 31 · 66 + 66: "Aa" and "BB" have the same value in a polynomial of base 31.
    const bytes = Buffer.from('Aa,BB,Aa,BB');
    const cells = new ByteCells(44, 4);
    cells.split(bytes, 0, bytes.length);
    expect([0, 1, 2, 3].map((k) => cells.text(k))).toEqual(['Aa', 'BB', 'Aa', 'BB']);
  });
});

describe('the way through bytes and the way through text', () => {
  const HEADER = ['time', 'mark', 'latitude', 'longitude', 'height', 'fix', 'pdop', 'note'];
  const row = fc
    .tuple(
      fc.constantFrom('2025-03-04T09:00:00Z', '2025-03-04', '', 'soon'),
      text,
      fc.oneof(number, fc.constant('47.0123456789')),
      fc.oneof(number, fc.constant('8.0123456789')),
      fc.oneof(number, fc.constant('500.125')),
      fc.constantFrom('fixed', 'float', 'FIXED', '4', ''),
      number,
      text,
    )
    .chain((cells) => fc.tuple(fc.constant(cells), fc.array(blank, { minLength: 16, maxLength: 16 })))
    .map(([cells, blanks]) => cells.map((each, k) => blanks[2 * k]! + each + blanks[2 * k + 1]!));
  // What stands in quotes is the same cell; a delimiter, a quote or a line end in it is another matter.
  const clean = (each: string): string => each.replace(/[",;\p{Cc}\ufffd]/gu, '');

  it('read the same positions', async () => {
    await fc.assert(
      fc.asyncProperty(fc.array(row, { minLength: 1, maxLength: 8 }), async (rows) => {
        const lines = rows.map((cells) => cells.map(clean));
        const write = (quote: (each: string) => string) =>
          [HEADER, ...lines].map((cells) => cells.map(quote).join(',')).join('\n');
        const fast = await readText(folder, `${write((each) => each)}\n`);
        // A quote in every line forces all of them through text.
        const slow = await readText(folder, `${write((each) => `"${each}"`)}\n`);
        expect(fast).toEqual(slow);
        expect(fast.rowsRead).toBe(rows.length);
      }),
      { seed: SEED, numRuns: 500 },
    );
  });

  it('read the same positions whatever the decimal mark', async () => {
    const points = fc.array(
      fc.tuple(
        fc.double({ min: -89, max: 89, noNaN: true }),
        fc.double({ min: -179, max: 179, noNaN: true }),
        fc.double({ min: -50, max: 4000, noNaN: true }),
      ),
      { minLength: 1, maxLength: 20 },
    );
    await fc.assert(
      fc.asyncProperty(points, async (places) => {
        const write = (comma: boolean) =>
          ['time;mark;latitude;longitude;height']
            .concat(
              places.map(([latitude, longitude, height]) => {
                const cells = [latitude.toFixed(10), longitude.toFixed(10), height.toFixed(4)].join(';');
                return `2025-03-04T09:00:00Z;CP1;${comma ? cells.replaceAll('.', ',') : cells}`;
              }),
            )
            .join('\r\n');
        const point = await readText(folder, write(false));
        const comma = await readText(folder, write(true), { layout: { decimal: 'comma' } });
        expect(comma.positions).toEqual(point.positions);
        expect(point.positions).toHaveLength(places.length);
      }),
      { seed: SEED, numRuns: 100 },
    );
  });

  it('read runs of blanks and tabs alike, also at the beginning of a line', async () => {
    const layout = { delimiter: 'blanks' };
    const lines = (gap: string, margin: string) =>
      [
        'time mark latitude longitude height fix',
        ...['CP1', 'CP2'].map((mark) =>
          [`2025-03-04T09:00:00Z`, mark, '47.01', '8.0', '500.0', 'fixed'].join(gap),
        ),
      ]
        .map((line) => `${margin}${line}${margin}`)
        .join('\n');
    const wanted = (await readText(folder, lines(' ', ''), { layout })).positions;
    expect(wanted).toHaveLength(2);
    for (const [gap, margin] of [
      ['  ', ''],
      ['\t', ''],
      [' \t ', ' '],
      ['   ', '\t'],
    ] as const) {
      expect((await readText(folder, lines(gap, margin), { layout })).positions).toEqual(wanted);
    }
    // A blank at the beginning is no cell: this row has no mark and must not move its numbers to the left.
    const short = [
      'mark latitude longitude height pdop',
      ' CP1 47.01 8.0 500.0 1.5',
      ' 47.01 8.0 500.0 1.5',
    ].join('\n');
    const { positions, setAside } = await readText(folder, short, {
      layout: { ...layout, constants: { date: '2025-03-04' } },
    });
    expect(positions.map(({ mark, latitudeDeg }) => [mark, latitudeDeg])).toEqual([['CP1', 47.01]]);
    expect(setAside).toHaveLength(1);
  });
});

describe('splitCells', () => {
  // Oracle: csv-parse 7.0.3, a published reader of delimited text; records of one line as in RFC 4180.
  it('agrees with csv-parse on lines of RFC 4180, but for blanks at the ends of cells', () => {
    const field = fc.string({
      unit: fc.constantFrom('a', '5', '.', '"', ',', ' ', '\t', 'é', '測', '-'),
      maxLength: 6,
    });
    fc.assert(
      fc.property(
        fc.array(fc.tuple(field, fc.boolean()), { minLength: 1, maxLength: 6 }),
        fc.constantFrom(',', ';', '|', '\t'),
        (fields, delimiter) => {
          const must = (value: string): boolean => value.includes('"') || value.includes(delimiter);
          const line = fields
            .map(([value, quote]) => (quote || must(value) ? `"${value.replaceAll('"', '""')}"` : value))
            .join(delimiter);
          fc.pre(line.trim() !== '');
          const [expected] = parse(line, { delimiter }) as string[][];
          expect(expected).toEqual(fields.map(([value]) => value));
          // Blanks around a cell belong to no value in a log: ours are trimmed, inside quotes too.
          expect(splitCells(line, delimiter)).toEqual(expected!.map((value) => value.trim()));
        },
      ),
      { seed: SEED, numRuns: 5000 },
    );
  });

  it('is wider than RFC 4180 in two ways, where csv-parse refuses the line', () => {
    const strict = (line: string) => () => parse(line, { delimiter: ',' });
    // A quote inside a cell that does not begin with one is a character.
    expect(strict('5" rod,c')).toThrow();
    expect(splitCells('5" rod,c', ',')).toEqual(['5" rod', 'c']);
    // Blanks outside the quotes do not count.
    expect(strict('"a" ,"b"')).toThrow();
    expect(splitCells('"a" ,"b"', ',')).toEqual(['a', 'b']);
    // What cannot be cut is refused by both.
    for (const line of ['"a', '"a"x,b', 'a,"b']) {
      expect(strict(line)).toThrow();
      expect(splitCells(line, ',')).toBe(null);
    }
  });

  it('cuts at runs of blanks as split does', () => {
    const word = fc.string({ unit: fc.constantFrom('a', '5', '.', 'é', ','), minLength: 1, maxLength: 4 });
    const gap = fc.string({ unit: fc.constantFrom(' ', '\t'), minLength: 1, maxLength: 3 });
    fc.assert(
      fc.property(fc.array(fc.tuple(word, gap), { minLength: 1, maxLength: 7 }), gap, (words, margin) => {
        const line = `${margin}${words.flat().join('')}`;
        expect(splitCells(line, ' ')).toEqual(words.map(([each]) => each));
        const quoted = `${margin}${words.map(([each, after]) => `"${each}"${after}`).join('')}`;
        expect(splitCells(quoted, ' ')).toEqual(words.map(([each]) => each));
      }),
      { seed: SEED, numRuns: 2000 },
    );
  });
});

describe('detectEncoding', () => {
  const bytes = (...parts: readonly (string | number)[]) =>
    Buffer.concat(parts.map((part) => (typeof part === 'string' ? Buffer.from(part) : Buffer.of(part))));

  it('takes a file for one byte a letter only where more bytes are no UTF-8 than letters are', () => {
    expect(detectEncoding(bytes('CP1,fixed'))).toEqual({ encoding: 'utf-8', guessed: false });
    expect(detectEncoding(bytes('Côte,', 0xff, ',Höhe'))).toEqual({ encoding: 'utf-8', guessed: false });
    expect(detectEncoding(bytes('H', 0xf6, 'he,L', 0xe4, 'nge'))).toEqual({
      encoding: 'latin1',
      guessed: true,
    });
    expect(detectEncoding(bytes('a', 0xff))).toEqual({ encoding: 'latin1', guessed: true });
  });

  it('does not mind where the first bytes of the file end inside a letter', () => {
    const text = Buffer.from('測点🛰');
    for (let end = 1; end <= text.length; end++) {
      expect(detectEncoding(text.subarray(0, end)).encoding).toBe('utf-8');
    }
  });
});

describe('readLineChunks', () => {
  const lines = async (content: Uint8Array, encoding: Parameters<typeof readLineChunks>[1], size: number) => {
    const found: string[] = [];
    let unterminated = false;
    for await (const chunk of readLineChunks(folder.write('chunks.txt', content), encoding, size)) {
      forEachLine(chunk.bytes, (start, end) => found.push(chunk.bytes.toString('utf8', start, end)));
      unterminated = chunk.unterminated;
    }
    return { found, unterminated };
  };
  const encode = {
    'utf-8': (content: string) => Buffer.from(content),
    'utf-16le': (content: string) => Buffer.from(content, 'utf16le'),
    'utf-16be': (content: string) => Buffer.from(content, 'utf16le').swap16(),
  };
  const content = fc.string({
    unit: fc.constantFrom('a', '\r', '\n', '\r\n', 'é', '測', '🛰', ',', '"', '\u2028', '\u0085'),
    maxLength: 60,
  });

  it('gives the lines of the file, wherever its pieces end', async () => {
    const mark = fc.boolean();
    await fc.assert(
      fc.asyncProperty(
        content,
        mark,
        fc.constantFrom('utf-8', 'utf-16le', 'utf-16be'),
        async (body, withMark, encoding) => {
          const expected = body.split(/\r\n|\n|\r/);
          // What follows the last line end is a line only when there is something.
          if (expected.at(-1) === '') expected.pop();
          const bytes = encode[encoding](`${withMark ? '\ufeff' : ''}${body}`);
          for (let size = 1; size <= 64; size++) {
            const { found, unterminated } = await lines(bytes, encoding, size);
            expect(found).toEqual(expected);
            expect(unterminated).toBe(body !== '' && !/[\r\n]$/.test(body));
          }
        },
      ),
      { seed: SEED, numRuns: 60 },
    );
  });

  it('reads one byte a letter', async () => {
    const { found } = await lines(Buffer.from('H\xf6he\r\nL\xe4nge\r5 \x80', 'latin1'), 'latin1', 3);
    expect(found).toEqual(['Höhe', 'Länge', '5 €']);
  });

  it('ends a line of millions of characters where it ends, whatever ends it', async () => {
    for (const end of ['\n', '\r\n', '\r']) {
      const body = `a${end}${'x'.repeat(1_100_000)}${end}b${end}c`;
      for (const size of [1 << 16, 100_001, 1_100_002, 1_100_003, 1_100_004]) {
        const { found } = await lines(Buffer.from(body), 'utf-8', size);
        expect(found.map((line) => Math.min(line.length, 2))).toEqual([1, 2, 1, 1]);
      }
    }
  });
});
