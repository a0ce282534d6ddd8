import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type FormedOccupations, formOccupations } from '../../src/errors/index.js';
import { type FileAccount, type RowReason, readLogs } from '../../src/logs/index.js';
import { control, MARKS, START_MS } from '../errors/world.js';
import { logFile, testFolder } from '../files.js';

const folder = testFolder();
const known = control();
const COLUMNS = ['time', 'base', 'mark', 'rover', 'latitude', 'longitude', 'height', 'fix', 'pdop', 'age'];
const COLUMN = Object.fromEntries(COLUMNS.map((name, k) => [name, k])) as Record<string, number>;
const EPOCHS = 4;

type Fate = 'used' | 'no row' | RowReason;

interface Line {
  cells: string[];
  fate: Fate;
}

/** A visit of four rows, one second apart. */
function visit(number: number): Line[] {
  const mark = ['CP1', 'CP2', 'CP3'][number % 3]!;
  const { latitudeDeg, longitudeDeg, heightM } = MARKS[mark]!;
  return Array.from({ length: EPOCHS }, (_, second) => ({
    cells: [
      new Date(START_MS + 600_000 * number + 1000 * second).toISOString(),
      'B1',
      mark,
      `R${number % 2}`,
      (latitudeDeg + 1e-7 * ((number * 5 + second) % 7)).toFixed(9),
      (longitudeDeg - 1e-7 * ((number * 3 + second) % 5)).toFixed(9),
      (heightM + 0.001 * ((number * 11 + second) % 13)).toFixed(4),
      'fixed',
      '1.4',
      '2.0',
    ],
    fate: 'used',
  }));
}

type Fault = (lines: Line[], at: number) => void;

const spoil =
  (column: string, text: string, fate: Fate): Fault =>
  (lines, at) => {
    lines[at]!.cells[COLUMN[column]!] = text;
    lines[at]!.fate = fate;
  };

/** What can be wrong with a row, and what must become of it. */
const FAULTS: Readonly<Record<string, Fault>> = {
  blankLatitude: spoil('latitude', '', 'no-position'),
  blankHeight: spoil('height', ' ', 'no-position'),
  blankTime: spoil('time', '', 'outside-study'),
  wordInLongitude: spoil('longitude', 'west', 'unreadable'),
  nan: spoil('height', 'NaN', 'unreadable'),
  wordInPdop: spoil('pdop', 'good', 'used'),
  farAway: spoil('latitude', '-47.000000000', 'unreadable'),
  impossible: spoil('latitude', '147.000000000', 'unreadable'),
  yearThreeThousand: spoil('time', '3000-01-01T00:00:00Z', 'unreadable'),
  otherDay: spoil('time', '2025-04-01T09:00:00Z', 'outside-study'),
  unknownMark: spoil('mark', 'CP-9', 'unknown-mark'),
  blankMark: spoil('mark', '', 'unknown-mark'),
  unknownBase: spoil('base', 'B9', 'unknown-base'),
  float: spoil('fix', 'float', 'not-fixed'),
  otherFix: spoil('fix', 'dgps', 'not-fixed'),
  openQuote: spoil('rover', '"R1', 'unreadable'),
  zeroByte: spoil('rover', 'R\u00001', 'unreadable'),
  short: (lines, at) => {
    lines[at]!.cells.length = 5;
    lines[at]!.fate = 'unreadable';
  },
  long: (lines, at) => {
    lines[at]!.cells.push('more');
    lines[at]!.fate = 'unreadable';
  },
  duplicate: (lines, at) => {
    lines.splice(at + 1, 0, { cells: [...lines[at]!.cells], fate: 'duplicate' });
  },
  conflicting: (lines, at) => {
    const cells = [...lines[at]!.cells];
    cells[COLUMN.height!] = '900.0000';
    lines[at]!.fate = 'conflicting';
    lines.splice(at, 0, { cells, fate: 'conflicting' });
  },
};

/** What may stand in a log and changes nothing. */
const HARMLESS: Readonly<Record<string, Fault>> = {
  comment: (lines, at) => lines.splice(at, 0, { cells: ['# a, comment'], fate: 'no row' }),
  blankLine: (lines, at) => lines.splice(at, 0, { cells: ['  '], fate: 'no row' }),
  header: (lines, at) => lines.splice(at, 0, { cells: COLUMNS, fate: 'no row' }),
  quotes: (lines, at) => {
    lines[at]!.cells = lines[at]!.cells.map((cell) => `"${cell}"`);
  },
  blanks: (lines, at) => {
    lines[at]!.cells = lines[at]!.cells.map((cell) => `  ${cell} `);
  },
  trailing: (lines, at) => lines[at]!.cells.push('', ''),
};

interface Written {
  readonly text: string;
  /** Line number of each row, from 1, and its fate. */
  readonly fates: readonly (readonly [row: number, fate: Fate])[];
}

function write(lines: readonly Line[], newline: string, bom: boolean): Written {
  const all: readonly Line[] = [{ cells: COLUMNS, fate: 'no row' }, ...lines];
  return {
    text: (bom ? '\ufeff' : '') + all.map(({ cells }) => cells.join(',') + newline).join(''),
    fates: all.map(({ fate }, k) => [k + 1, fate]),
  };
}

async function form(files: readonly string[]): Promise<FormedOccupations> {
  const logs = files.map((text, k) => logFile(folder.write(`${k}.csv`, text), `${k}.csv`));
  const period = { from: '2025-03-01', to: '2025-03-31' };
  return formOccupations(readLogs(logs, { timeZone: null }), known, { timeZone: 'UTC', period });
}

/** The account that the fates of the rows ask for, counted apart from the code under test. */
function expectedAccount(file: string, { fates }: Written): FileAccount {
  const rows = fates.filter(([, fate]) => fate !== 'no row');
  const setAside: Record<string, { count: number; firstRows: number[] }> = {};
  for (const [row, fate] of rows) {
    if (fate === 'used') continue;
    setAside[fate] ??= { count: 0, firstRows: [] };
    setAside[fate].count += 1;
    if (setAside[fate].firstRows.length < 5) setAside[fate].firstRows.push(row);
  }
  return { file, read: rows.length, used: rows.filter(([, fate]) => fate === 'used').length, setAside };
}

const placeless = (occupation: FormedOccupations['occupations'][number]) => {
  const { file: _, row: __, ...rest } = occupation;
  return rest;
};

describe('the account of faulty logs', () => {
  const faultOfVisit = fc.record({
    fault: fc.option(fc.constantFrom(...Object.keys(FAULTS)), { nil: null, freq: 3 }),
    harmless: fc.option(fc.constantFrom(...Object.keys(HARMLESS)), { nil: null }),
    at: fc.nat(EPOCHS - 1),
    harmlessAt: fc.nat(EPOCHS - 1),
    file: fc.nat(2),
  });

  it('adds up for every file, and occupations that no fault touches keep their values', async () => {
    await fc.assert(
      fc.asyncProperty(
        fc.array(faultOfVisit, { minLength: 1, maxLength: 25 }),
        fc.constantFrom('\n', '\r\n', '\r'),
        fc.boolean(),
        async (plans, newline, bom) => {
          const files: Line[][] = [[], [], []];
          const clean: Line[] = [];
          const touched = new Set<number>();
          plans.forEach(({ fault, harmless, at, harmlessAt, file }, k) => {
            const lines = visit(k);
            clean.push(...visit(k));
            if (harmless !== null) HARMLESS[harmless]!(lines, harmlessAt);
            const rows = lines.flatMap(({ fate }, i) => (fate === 'used' ? [i] : []));
            if (fault !== null) {
              FAULTS[fault]!(lines, rows[at]!);
              // A row that stands twice changes nothing.
              if (fault !== 'duplicate') touched.add(START_MS + 600_000 * k);
            }
            files[file]!.push(...lines);
          });
          const written = files.map((lines) => write(lines, newline, bom));
          const formed = await form(written.map(({ text }) => text));
          expect(formed.files).toEqual(written.map((file, k) => expectedAccount(`${k}.csv`, file)));
          for (const { read, used, setAside } of formed.files) {
            const aside = Object.values(setAside).reduce((total, { count }) => total + count, 0);
            expect(read).toBe(used + aside);
          }
          const untouched = ({ startMs }: { startMs: number }) =>
            !touched.has(START_MS + 600_000 * Math.floor((startMs - START_MS) / 600_000));
          const whole = await form([write(clean, '\n', false).text]);
          expect(formed.occupations.filter(untouched).map(placeless)).toEqual(
            whole.occupations.filter(untouched).map(placeless),
          );
          expect(JSON.stringify(formed.messages)).not.toMatch(/undefined|NaN"? |\[object/);
        },
      ),
      { seed: 20250305, numRuns: 150 },
    );
  });

  it('adds up when the last line is cut off anywhere', async () => {
    const { text } = write([...visit(0), ...visit(1)], '\n', false);
    const last = text.trimEnd().lastIndexOf('\n') + 1;
    const whole = await form([text]);
    for (let end = last; end <= text.length; end++) {
      const cut = text.slice(0, end);
      const formed = await form([cut]);
      const cells = cut.slice(last).trimEnd();
      const fate =
        cells === '' ? 'no row' : cells.split(',').length === COLUMNS.length ? 'used' : 'unreadable';
      const read = 2 * EPOCHS - (fate === 'no row' ? 1 : 0);
      expect(formed.files).toEqual([
        {
          file: '0.csv',
          read,
          used: read - (fate === 'unreadable' ? 1 : 0),
          setAside: fate === 'unreadable' ? { unreadable: { count: 1, firstRows: [9] } } : {},
        },
      ]);
      expect(formed.occupations[0]).toEqual(whole.occupations[0]);
    }
  });

  it('adds up when the text is any text', async () => {
    const line = fc.oneof(
      fc.constantFrom(COLUMNS.join(','), visit(0)[0]!.cells.join(','), '', '#', '"', ',,,'),
      fc.string({ unit: 'binary', maxLength: 60 }),
      fc.string({ unit: fc.constantFrom(',', '"', '\r', '0', '-', 'CP1', '\u0000', 'time'), maxLength: 30 }),
    );
    await fc.assert(
      fc.asyncProperty(fc.array(line, { maxLength: 12 }), async (lines) => {
        const { files, occupations } = await form([lines.join('\n')]);
        const [{ read, used, setAside }] = files as [FileAccount];
        expect(read).toBe(used + Object.values(setAside).reduce((total, { count }) => total + count, 0));
        expect(used).toBe(occupations.reduce((total, { epochs }) => total + epochs, 0));
      }),
      { seed: 20250306, numRuns: 300 },
    );
  });
});
