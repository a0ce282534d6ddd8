import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Position } from '../../src/logs/index.js';
import { testFolder } from '../files.js';
import { gga, gsa, gst, readSentences, rmc } from './sentences.js';

const folder = testFolder();
const BLOCKS = 40;

/** Blocks of GGA, GSA, RMC, GST, one a second over midnight, each with values of its own. */
const blocks: readonly (readonly string[])[] = Array.from({ length: BLOCKS }, (_, k) => {
  const iso = new Date(Date.UTC(2025, 1, 28, 23, 59, 40 + k)).toISOString();
  const time = `${iso.slice(11, 19).replaceAll(':', '')}.00`;
  const date = `${iso.slice(8, 10)}${iso.slice(5, 7)}25`;
  const two = String(k + 10);
  return [
    gga(time, { latitude: `4807.038123${two},N`, longitude: `01131.123456${two},E`, height: `545.4${two}` }),
    gsa(`1.${two}`),
    rmc(time, date),
    gst(time, `0.0${two}`, `0.0${two}`, `0.1${two}`),
  ];
});
const lines = blocks.flat();

/** All that a position tells but where it stands, which lines lost or won above it change. */
const values = ({ row: _, ...rest }: Position): string => JSON.stringify(rest);

interface Damage {
  readonly kind: 'cut' | 'doubled' | 'swapped' | 'changed';
  readonly line: number;
  readonly at: number;
  readonly length: number;
}

/** Damages a line and gives it back; bytes, not characters. */
function damaged(line: Buffer, { kind, at, length }: Damage): Buffer {
  const from = at % line.length;
  const to = Math.min(line.length, from + length);
  const [before, part, after] = [line.subarray(0, from), line.subarray(from, to), line.subarray(to)];
  switch (kind) {
    case 'cut':
      return Buffer.concat([before, after]);
    case 'doubled':
      return Buffer.concat([before, part, part, after]);
    case 'swapped':
      return Buffer.concat([before, Buffer.from(part).reverse(), after]);
    case 'changed':
      return Buffer.concat([before, part.map((byte) => byte ^ (1 + (at % 255))), after]);
  }
}

const damages = (firstLine: number): fc.Arbitrary<Damage[]> =>
  fc.array(
    fc.record({
      kind: fc.constantFrom('cut', 'doubled', 'swapped', 'changed'),
      // The line break of the line before belongs to the line, so that lines are joined too.
      line: fc.integer({ min: firstLine, max: lines.length - 1 }),
      at: fc.nat(1000),
      length: fc.integer({ min: 1, max: 12 }),
    }),
    { maxLength: 30 },
  );

describe('a damaged log', () => {
  it('is read to its end, its account adds up, and blocks that were not touched keep their values', async () => {
    const whole = await readSentences(folder, lines);
    expect(whole.positions).toHaveLength(BLOCKS);
    const untouchedValues = whole.positions.map(values);
    // The first block stays whole: nothing tells whether a lone GSA at the very beginning leads the next block.
    await fc.assert(
      fc.asyncProperty(damages(4), async (all) => {
        const bytes: Buffer[] = lines.map((line, k) => Buffer.from(k === 0 ? line : `\r\n${line}`));
        const touched = new Set<number>();
        for (const damage of all) {
          bytes[damage.line] = damaged(bytes[damage.line]!, damage);
          touched.add(Math.floor(damage.line / 4));
          // A lost line break can spoil the end of the line before.
          touched.add(Math.floor((damage.line - 1) / 4));
          if (bytes[damage.line]!.length === 0) bytes[damage.line] = Buffer.from('\r\n');
        }
        const { rowsRead, positions, setAside } = await readSentences(folder, Buffer.concat(bytes));
        expect(rowsRead).toBe(positions.length + setAside.length);
        const found = new Set(positions.map(values));
        const lost = untouchedValues.filter((value, k) => !touched.has(k) && !found.has(value));
        expect(lost).toEqual([]);
      }),
      { seed: 44, numRuns: 500 },
    );
  });

  it('has as many rows as there are beginnings of GGA, and never coordinates 0, 0', async () => {
    const text = fc.array(
      fc.oneof(
        fc.constantFrom(...lines.slice(0, 8)),
        fc.constantFrom('$GPGGA', '$GNGGA,', '$', '*', '*00', '\n', '\r\n', ',', '0000.00,N,00000.00,E,0'),
        fc.constant('$GPGGA,,,,,,0,,,,,,,,*66'),
        fc.string({ unit: 'binary-ascii', maxLength: 10 }),
      ),
      { maxLength: 30 },
    );
    await fc.assert(
      fc.asyncProperty(text, async (parts) => {
        const content = parts.join('');
        const { rowsRead, positions, setAside } = await readSentences(folder, Buffer.from(content, 'latin1'));
        expect(rowsRead).toBe(content.match(/\$[A-OQ-Z][A-Z\d]GGA/g)?.length ?? 0);
        expect(rowsRead).toBe(positions.length + setAside.length);
        for (const { latitudeDeg } of positions) expect(latitudeDeg === 0).toBe(false);
      }),
      { seed: 45, numRuns: 500 },
    );
  });

  it('never stops at arbitrary bytes', async () => {
    await fc.assert(
      fc.asyncProperty(fc.uint8Array({ maxLength: 300 }), async (bytes) => {
        const { rowsRead, positions, setAside } = await readSentences(folder, bytes);
        expect(rowsRead).toBe(positions.length + setAside.length);
      }),
      { seed: 46, numRuns: 300 },
    );
  });
});
