import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { testFolder } from '../files.js';
import { readAs, recognize } from './heads.js';

/*
 * One table of positions written in many ways. Whatever the way: a recognition that asks nothing reads back exactly what
 * was written.
 */

const folder = testFolder();

interface Point {
  readonly utcMs: number;
  readonly mark: string;
  readonly latitudeDeg: number;
  readonly longitudeDeg: number;
  readonly heightM: number;
  readonly fix: string;
}

const point = fc.record({
  second: fc.integer({ min: 0, max: 30_000_000 }),
  mark: fc.constantFrom('CP1', 'M03-2', 'CHK 1023', 'Mühle', '007'),
  latitudeDeg: fc.integer({ min: -85_000_000_000, max: 85_000_000_000 }).map((value) => value / 1e9),
  longitudeDeg: fc.integer({ min: -179_000_000_000, max: 179_000_000_000 }).map((value) => value / 1e9),
  heightM: fc.integer({ min: -400_000, max: 8_000_000 }).map((value) => value / 1000),
  fix: fc.constantFrom('fixed', 'float'),
});

const pad = (value: number): string => String(value).padStart(2, '0');
const TIMES: Readonly<Record<string, (t: Date) => string>> = {
  iso: (t) => t.toISOString().replace('.000', ''),
  wall: (t) => t.toISOString().slice(0, 19).replace('T', ' '),
  dayFirst: (t) =>
    `${pad(t.getUTCDate())}.${pad(t.getUTCMonth() + 1)}.${t.getUTCFullYear()} ${t.toISOString().slice(11, 19)}`,
  monthFirst: (t) =>
    `${t.getUTCMonth() + 1}/${t.getUTCDate()}/${t.getUTCFullYear()} ${t.getUTCHours() % 12 || 12}:${pad(t.getUTCMinutes())}:${pad(t.getUTCSeconds())} ${t.getUTCHours() < 12 ? 'AM' : 'PM'}`,
};

const style = fc.record({
  delimiter: fc.constantFrom(',', ';', '\t', '|'),
  decimal: fc.constantFrom('.', ','),
  header: fc.constantFrom('roles', 'trade', 'words', 'none'),
  time: fc.constantFrom(...Object.keys(TIMES)),
  order: fc.shuffledSubarray(['time', 'mark', 'place', 'fix'], { minLength: 4, maxLength: 4 }),
  title: fc.boolean(),
  encoding: fc.constantFrom('utf8', 'latin1', 'utf16le'),
});

const HEADERS: Readonly<Record<string, Readonly<Record<string, string>>>> = {
  roles: { time: 'time', mark: 'mark', place: 'latitude longitude height', fix: 'fix' },
  trade: { time: 'Date_Time', mark: 'Point', place: 'Lat Lon Hgt(m)', fix: 'Solution' },
  words: { time: 'Uhr', mark: 'Ort', place: 'Breite Weite Oben', fix: 'Guete' },
};

describe('a table written in any way', () => {
  it('is read back exactly, or something is asked', async () => {
    let [complete, asked] = [0, 0];
    await fc.assert(
      fc.asyncProperty(fc.array(point, { minLength: 1, maxLength: 12 }), style, async (drawn, how) => {
        const points: Point[] = drawn.map(({ second, ...rest }) => ({
          ...rest,
          utcMs: Date.UTC(2025, 0, 1) + second * 1000,
        }));
        const separate = how.decimal === ',' && how.delimiter === ',';
        const number = (value: number, decimals: number): string => {
          const text = value.toFixed(decimals).replace('.', how.decimal);
          return separate ? `"${text}"` : text;
        };
        const cells = (p: Point): string[] => {
          const parts: Readonly<Record<string, readonly string[]>> = {
            time: [TIMES[how.time]!(new Date(p.utcMs))],
            mark: [p.mark],
            place: [number(p.latitudeDeg, 9), number(p.longitudeDeg, 9), number(p.heightM, 3)],
            fix: [p.fix],
          };
          return how.order.flatMap((part) => parts[part]!);
        };
        const names = how.order.flatMap((part) => HEADERS[how.header]?.[part]?.split(' ') ?? []);
        const lines = [
          ...(how.title ? ['Harbour job'] : []),
          ...(names.length > 0 ? [names.join(how.delimiter)] : []),
          ...points.map((p) => cells(p).join(how.delimiter)),
        ];
        const text = `${lines.join('\n')}\n`;
        const content = Buffer.from(
          how.encoding === 'utf16le' ? `\ufeff${text}` : text,
          how.encoding as BufferEncoding,
        );
        const found = recognize(content, { timeZone: 'UTC' });
        if (found.kind === 'unrecognized' || !found.complete) {
          asked += 1;
          return;
        }
        complete += 1;
        const { layout, coordinates } = found;
        // A number behind the coordinates is not taken for a name, and this is told.
        const isNameless = found.unsure.some(({ code }) => code === 'no-mark');
        const log = await readAs(folder, content, layout, { coordinates: coordinates!, timeZone: 'UTC' });
        const read = log.positions.map((p) => ({
          utcMs: p.utcMs,
          mark: p.mark || p.pointNumber || p.description || (isNameless ? '007' : ''),
          latitudeDeg: p.latitudeDeg,
          longitudeDeg: p.longitudeDeg,
          heightM: p.heightM,
          fix: p.fix,
        }));
        expect(read, `${text}\n${JSON.stringify(layout)}`).toEqual(points);
      }),
      { seed: 11, numRuns: 600 },
    );
    // Most ways leave nothing to ask; those that do must not be the rule.
    expect(complete).toBeGreaterThan(300);
    expect(asked).toBeGreaterThan(20);
  });
});
