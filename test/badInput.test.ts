import { execFile } from 'node:child_process';
import { existsSync, mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { beforeAll, describe, type ExpectStatic, it } from 'vitest';
import { basesText, type LogRow, logText, marksText, simulateLog } from '../src/campaign/index.js';
import { formatMessage } from '../src/logs/index.js';
import type { Results } from '../src/study/index.js';
import { testFolder } from './files.js';

/*
 * Bad input through the built command line: the exit code says what became of it (0 at least one fit, 1 none, 2 a
 * mistake of the user), messages name the place, and nobody sees a stack trace.
 */

const main = fileURLToPath(new URL('../dist/cli/main.js', import.meta.url));
const folder = testFolder();

const CAMPAIGN = {
  seed: 4,
  days: 6,
  marks: { count: 5, nearestKm: 0.5, farthestKm: 15 },
  occupationsPerDay: { from: 10, to: 14 },
  workHours: { from: 8, to: 17 },
  floatRowShare: 0,
  noFix: { shareAt1Km: 0, shareAt12Km: 0 },
  unknownMarkShare: 0,
  duplicateRowShare: 0,
};
const { marks, base, rows } = simulateLog(CAMPAIGN);
const LOG = logText(rows);
const MARKS = marksText(marks, { horizontal: 1, vertical: 2 });
const BASES = basesText([base]);
const STUDY = `marks: marks.csv
bases: bases.csv
logs:
  - files: log.csv
tolerances:
  - {component: horizontal, limitMm: 25}
  - {component: vertical, limitMm: 40}
`;

const logWith = (change: (row: LogRow, k: number) => Partial<LogRow>): string =>
  logText(rows.map((row, k) => ({ ...row, ...change(row, k) })));

/** The log with cells of some lines changed; line 1 is the header. */
function logCells(change: (cells: string[], line: number) => void): string {
  const lines = LOG.trimEnd().split('\n');
  return `${lines
    .map((line, k) => {
      const cells = line.split(',');
      change(cells, k + 1);
      return cells.join(',');
    })
    .join('\n')}\n`;
}

interface Files {
  readonly marks?: string | null;
  readonly bases?: string | null;
  readonly log?: string | Uint8Array | null;
  readonly study?: string;
}

interface Outcome {
  readonly code: number;
  readonly stdout: string;
  readonly stderr: string;
  readonly results: Results | null;
  readonly report: string | null;
  readonly dir: string;
}

let studies = 0;

/** Lays a study out in a folder of its own; null leaves a file away. */
function lay({ marks: m = MARKS, bases: b = BASES, log = LOG, study = STUDY }: Files): string {
  const name = `study-${studies++}`;
  for (const [file, content] of Object.entries({
    'marks.csv': m,
    'bases.csv': b,
    'log.csv': log,
    'study.yaml': study,
  })) {
    if (content !== null) folder.write(`${name}/${file}`, content);
  }
  return join(folder.path, name);
}

function ppmwise(dir: string, args: readonly string[]): Promise<Outcome> {
  return new Promise((resolve) => {
    execFile(process.execPath, [main, ...args], { cwd: dir, maxBuffer: 1 << 26 }, (error, stdout, stderr) => {
      const text = (name: string) => {
        const path = join(dir, 'results', name);
        return existsSync(path) ? readFileSync(path, 'utf8') : null;
      };
      const results = text('results.json');
      resolve({
        code: error === null ? 0 : (error.code as unknown as number),
        stdout,
        stderr,
        results: results === null ? null : (JSON.parse(results) as Results),
        report: text('report.html'),
        dir,
      });
    });
  });
}

const total = (counts: Readonly<Record<string, number>>): number =>
  Object.values(counts).reduce((sum, count) => sum + count, 0);

/** Runs a study and holds it to what is true of every run. */
async function run(expect: ExpectStatic, code: number, files: Files, args: readonly string[] = []) {
  const outcome = await ppmwise(lay(files), ['run', 'study.yaml', ...args]);
  const { results, report, stdout, stderr } = outcome;
  expect(stderr).not.toMatch(/^ {4}at /m);
  expect(stdout + stderr).not.toMatch(/undefined|\[object|(?<!")\bNaN\b/);
  expect(outcome.code, stdout + stderr).toBe(code);
  if (code === 2) {
    expect(stderr).toMatch(/\S\n$/);
    expect(results).toBe(null);
    return { ...outcome, messages: [] as readonly string[], result: null as unknown as Results };
  }
  expect(stderr).toBe('');
  expect(report).toContain('</html>');
  const result = results!;
  expect(result.fits.length > 0).toBe(code === 0);
  expect(result.rows.read).toBe(result.rows.used + total(result.rows.setAside));
  for (const { read, used, setAside } of result.files) {
    const aside = Object.values(setAside).reduce((sum, { count }) => sum + count, 0);
    expect(read).toBe(used + aside);
  }
  const messages = result.messages.map(formatMessage);
  // What is wrong is told on the terminal too.
  for (const message of result.messages) {
    if (message.severity !== 'info') expect(stdout).toContain(formatMessage(message));
  }
  return { ...outcome, messages, result };
}

beforeAll(() => {
  if (!existsSync(main)) throw new Error('The command line is not built. Run "npm run build" first.');
});

describe.concurrent('mistakes of command, study file or files: exit code 2', () => {
  it('a study file that is not there, and a folder in its place', async ({ expect }) => {
    const dir = lay({});
    const missing = await ppmwise(dir, ['run', 'studi.yaml']);
    expect([missing.code, missing.stdout]).toEqual([2, '']);
    expect(missing.stderr).toBe(
      'studi.yaml error: Expected a study file, came a path that does not exist. Name the file, or make one with "ppmwise new DIR".\n',
    );
    const inPlace = await ppmwise(dir, ['run', '.']);
    expect(inPlace.code).toBe(2);
    expect(inPlace.stderr).toContain('Expected a study file, came a folder.');
  });

  it('a command or an option that does not exist, and no command', async ({ expect }) => {
    const dir = lay({});
    for (const args of [['rum', 'study.yaml'], ['run'], ['run', 'study.yaml', '--fource'], []]) {
      const { code, stderr } = await ppmwise(dir, args);
      expect(code, args.join(' ')).toBe(2);
      expect(stderr).not.toMatch(/^ {4}at /m);
    }
  });

  it('a log that is not there', async ({ expect }) => {
    const { stderr } = await run(expect, 2, { log: null });
    expect(stderr).toBe(
      'study.yaml:4 [logs[0].files] error: Expected log files that match "log.csv" in the folder of the study file, there are none. Put the exported logs there or correct the pattern, such as "logs/*.csv".\n',
    );
  });

  it('marks and bases files that are not there', async ({ expect }) => {
    const { stderr } = await run(expect, 2, { marks: null, bases: null });
    expect(stderr.split('\n').map((line) => line.slice(0, 60))).toEqual([
      'study.yaml:1 [marks] error: Expected the marks file "marks.c',
      'study.yaml:2 [bases] error: Expected the bases file "bases.c',
      '',
    ]);
  });

  it('a folder where a file is expected', async ({ expect }) => {
    const { stderr } = await run(expect, 2, {
      study: STUDY.replace('log.csv', '.').replace('marks.csv', '..'),
    });
    expect(stderr).toContain('study.yaml:1 [marks] error: Expected the marks file ".."');
    expect(stderr).toContain('study.yaml:4 [logs[0].files] error: Expected log files that match "."');
  });

  it('a misspelt key', async ({ expect }) => {
    const { stderr } = await run(expect, 2, { study: STUDY.replace('tolerances', 'tolerance') });
    expect(stderr).toBe(
      'study.yaml:5 [tolerance] error: The key "tolerance" is not known. Did you mean "tolerances"? Correct or remove it.\n',
    );
  });

  it('broken YAML', async ({ expect }) => {
    const { stderr } = await run(expect, 2, { study: `${STUDY}title: [a\n` });
    expect(stderr).toMatch(/^study\.yaml:\d+ error: The file is not valid YAML: .*\. Correct the line\.\n/);
  });

  it('a faulty cell in the marks file', async ({ expect }) => {
    const { stderr } = await run(expect, 2, { marks: MARKS.replace(/^(M\w*|[^,\n]+),4/m, '$1,4x') });
    expect(stderr).toMatch(/^marks\.csv:2 \[latitude\] error: Expected a number, came "4x/);
  });

  it('results that would overwrite something else', async ({ expect }) => {
    const dir = lay({});
    mkdirSync(join(dir, 'results'));
    writeFileSync(join(dir, 'results', 'diary.txt'), 'mine');
    const refused = await ppmwise(dir, ['run', 'study.yaml']);
    expect(refused.code).toBe(2);
    expect(refused.stderr).toContain('The folder holds something that is no result of ppmwise.');
    expect(readdirSync(join(dir, 'results'))).toEqual(['diary.txt']);
    const forced = await ppmwise(dir, ['run', 'study.yaml', '--force']);
    expect(forced.code).toBe(0);
    expect(readFileSync(join(dir, 'results', 'diary.txt'), 'utf8')).toBe('mine');
    const again = await ppmwise(dir, ['run', 'study.yaml']);
    expect(again.code).toBe(0);
    const file = await ppmwise(dir, ['run', 'study.yaml', '--out', 'log.csv']);
    expect(file.code).toBe(2);
    expect(file.stderr).toContain('Expected a folder for the results, came a file.');
    expect(readFileSync(join(dir, 'log.csv'), 'utf8')).toBe(LOG);
  });
});

describe.concurrent('logs that allow no fit: exit code 1, with results that say why', () => {
  it('an empty log', async ({ expect }) => {
    const { messages, result } = await run(expect, 1, { log: '' });
    expect(messages).toContain(
      'log.csv warning: Expected a header and positions, came an empty file. Export it again.',
    );
    expect(result.rows).toEqual({ read: 0, used: 0, setAside: {} });
  });

  it('a log without a header', async ({ expect }) => {
    // What a header would say is asked for before anything is read.
    const { stderr } = await run(expect, 2, { log: LOG.slice(LOG.indexOf('\n') + 1) });
    expect(stderr).toMatch(
      /^log\.csv error: Which of column 6 and column 7 is the latitude\? .* State "layout\.columns"/m,
    );
  });

  it('a log without a column that is needed', async ({ expect }) => {
    const { messages, result } = await run(expect, 1, { log: LOG.replace('height', 'heigth') });
    expect(messages[0]).toMatch(
      /^log\.csv:1 \[height\] error: Expected a column "height", came .* Did you mean "heigth"\? Add the column/,
    );
    expect(result.rows.setAside).toEqual({ unreadable: rows.length });
  });

  it('a layout with a column that the log has not', async ({ expect }) => {
    const study = STUDY.replace('log.csv', 'log.csv\n    layout: {kind: delimited, columns: {mark: marc}}');
    const { messages } = await run(expect, 1, { study });
    expect(messages[0]).toMatch(
      /^log\.csv:1 \[marc\] error: The layout names a column "marc" for mark, the file has none\. Did you mean "mark"\?/,
    );
  });

  it('a log of float rows only', async ({ expect }) => {
    const { messages, result } = await run(expect, 1, { log: logWith(() => ({ fix: 'float' })) });
    expect(result.rows.setAside).toEqual({ 'not-fixed': rows.length });
    expect(result.visits.withoutFix).toBeGreaterThan(50);
    expect(messages.join('\n')).toContain('No occupation is left to fit');
  });

  it('a log with codes in the fix column', async ({ expect }) => {
    const { messages } = await run(expect, 1, { log: LOG.replaceAll(',fixed,', ',4,') });
    expect(messages[0]).toMatch(
      /^log\.csv:2 \[fix\] warning: Expected "fixed" or "float", came "4" in \d+ rows: these count as not fixed\. Say in fixValues/,
    );
  });

  it('binary rubbish', async ({ expect }) => {
    const rubbish = Uint8Array.from({ length: 5000 }, (_, k) => (k * k * 31 + 7 * k + 200) % 256);
    expect((await run(expect, 1, { log: rubbish })).messages[0]).toMatch(
      /^log\.csv:1 error: Expected delimited text, came binary data\./,
    );
  });

  it('a base that the bases file does not hold', async ({ expect }) => {
    const { messages, result } = await run(expect, 1, { bases: BASES.replace('B1', 'B-01') });
    expect(messages).toContain(
      `log.csv:2 warning: ${rows.length} rows are set aside as unknown-base: no base is named "B1" (did you mean "B-01"?). Add the base to the bases file or correct the name.`,
    );
    expect(result.rows.setAside).toEqual({ 'unknown-base': rows.length });
  });

  it('heights of another kind, 47 m off', async ({ expect }) => {
    const { messages, result } = await run(expect, 1, {
      log: logWith(({ heightM }) => ({ heightM: heightM + 47 })),
    });
    expect(result.occupations.setAside).toEqual({ 'error-over-10-m': result.occupations.formed });
    expect(messages.join('\n')).toMatch(
      /log\.csv:2 warning: \d+ of \d+ occupations are more than 10 m .* So many have one cause: check units, coordinate system, height system/,
    );
  });

  it('latitude and longitude swapped', async ({ expect }) => {
    const { messages } = await run(expect, 1, {
      log: logWith(({ latitudeDeg, longitudeDeg }) => ({
        latitudeDeg: longitudeDeg,
        longitudeDeg: latitudeDeg,
      })),
    });
    expect(messages.join('\n')).toContain(
      'km from it; if it is one mark, check its coordinates, if it is all, look for swapped columns',
    );
  });

  it('decimal commas', async ({ expect }) => {
    const log = LOG.replaceAll(',', ';').replaceAll('.', ',');
    const { messages } = await run(expect, 0, { log });
    expect(messages.join('\n')).toMatch(/log\.csv info: The layout of this log was recognised as .*decimal/);
    const stated = await run(expect, 1, {
      log,
      study: STUDY.replace('log.csv', 'log.csv\n    layout: {kind: delimited}'),
    });
    expect(stated.messages.join('\n')).toMatch(
      /log\.csv:2 \[latitude\] warning: .* with a decimal comma; state decimal: comma in the layout\./,
    );
  });
});

describe.concurrent('logs with faults that leave enough: exit code 0', () => {
  it('words and NaN in number columns, with row and column', async ({ expect }) => {
    const log = logCells((cells, line) => {
      if (line === 12) cells[7] = 'NaN';
      if (line === 14) cells[5] = 'north';
      if (line === 16) cells[10] = 'good';
      if (line === 18) cells[0] = '3000-01-01T00:00:00Z';
      if (line === 20) cells.length = 4;
    });
    const { messages, result } = await run(expect, 0, { log });
    const text = messages.join('\n');
    expect(text).toContain(
      'log.csv:12 [height] warning: 1 row is set aside as unreadable: expected a number, came "NaN".',
    );
    expect(text).toContain(
      'log.csv:14 [latitude] warning: 1 row is set aside as unreadable: expected a number, came "north".',
    );
    expect(text).toContain(
      'log.csv:16 [pdop] warning: Expected a number, came "good": 1 row is read without this value.',
    );
    expect(text).toContain(
      'log.csv:18 [time] warning: 1 row is set aside as unreadable: expected a time in the years 1980 to 2099',
    );
    expect(text).toContain(
      'log.csv:20 warning: 1 row is set aside as unreadable: expected 12 cells as in the header, came 4.',
    );
    expect(result.files[0]!.setAside).toEqual({ unreadable: { count: 4, firstRows: [12, 14, 18, 20] } });
  });

  it('a last line that is cut off', async ({ expect }) => {
    const { messages, result } = await run(expect, 0, { log: LOG.slice(0, -60) });
    expect(result.rows.setAside).toEqual({ unreadable: 1 });
    expect(messages.join('\n')).toContain(
      `log.csv:${rows.length + 1} warning: 1 row is set aside as unreadable`,
    );
  });

  it('a second header with other columns', async ({ expect }) => {
    const [header, ...lines] = LOG.trimEnd().split('\n');
    const swapped = lines.map((line) => {
      const cells = line.split(',');
      return [...cells.slice(0, 5), cells[6], cells[5], ...cells.slice(7)].join(',');
    });
    const log = [
      header,
      ...lines.slice(0, 50),
      header!.replace('latitude,longitude', 'longitude,latitude'),
      ...swapped.slice(50),
    ].join('\n');
    const { messages, result } = await run(expect, 0, { log });
    expect(result.rows).toEqual({ read: rows.length, used: rows.length, setAside: {} });
    expect(messages[0]).toMatch(
      /^log\.csv:52 warning: Expected rows under the first header, came a header with other columns/,
    );
    expect(result.occupations.setAside).toEqual({});
  });

  it('a mark that is 1 m wrong is named and kept', async ({ expect }) => {
    const wrong = marks[2]!.name;
    const moved = marks.map((mark) => (mark.name === wrong ? { ...mark, heightM: mark.heightM + 1 } : mark));
    const { messages, result } = await run(expect, 0, {
      marks: marksText(moved, { horizontal: 1, vertical: 2 }),
    });
    expect(messages.join('\n')).toMatch(
      new RegExp(`warning: Mark "${wrong}" is measured (0\\.9|1\\.0)\\d* m from its known coordinates`),
    );
    expect(result.marks.find(({ mark }) => mark === wrong)!.up).toBeLessThan(-900);
    expect(result.occupations.setAside).toEqual({});
  });

  it('one occupation 12 m off is set aside and named', async ({ expect }) => {
    const { mark, rover, timeMs } = rows[0]!;
    const { messages, result } = await run(expect, 0, {
      log: logWith((row) =>
        row.mark === mark && row.rover === rover && row.timeMs < timeMs + 60_000
          ? { heightM: row.heightM + 12 }
          : {},
      ),
    });
    expect(result.occupations.setAside).toEqual({ 'error-over-10-m': 1 });
    expect(messages.join('\n')).toContain(
      `log.csv:2 warning: 1 occupation is more than 10 m from the known coordinates and set aside: on mark "${mark}"`,
    );
  });

  it('all marks at one distance: no ppm and no maximum baseline', async ({ expect }) => {
    const plan = [20, 140, 260].map((azimuthDeg, k) => ({
      name: `M${k}`,
      baselineKm: 5,
      azimuthDeg,
      heightM: base.heightM,
      source: 'static session',
      sky: 'open',
    }));
    const alike = simulateLog({ ...CAMPAIGN, marks: plan, marksPerCrew: { from: 1, to: 1 } });
    const { result } = await run(expect, 0, {
      marks: marksText(alike.marks, { horizontal: 1, vertical: 2 }),
      log: logText(alike.rows),
    });
    for (const { ppm, notes } of result.fits) {
      expect(ppm).toEqual({ estimate: null, low: null, high: null });
      expect(notes.length).toBeGreaterThan(0);
    }
  });

  it('three days only: estimates without intervals, and no rule', async ({ expect }) => {
    const days = [...new Set(rows.map(({ timeMs }) => new Date(timeMs).toISOString().slice(0, 10)))];
    const three = rows.filter(({ timeMs }) =>
      days.slice(0, 3).includes(new Date(timeMs).toISOString().slice(0, 10)),
    );
    const { result } = await run(expect, 0, { log: logText(three) });
    expect(result.days).toBe(3);
    for (const { constantMm } of result.fits) {
      expect(constantMm.estimate).not.toBe(null);
      expect([constantMm.low, constantMm.high]).toEqual([null, null]);
    }
    for (const { maximumBaselineKm, reason } of result.rules) {
      expect(maximumBaselineKm).toBe(null);
      expect(reason).not.toBe(null);
    }
  });

  it('a name that is a script stands nowhere as one', async ({ expect }) => {
    const script = '<script>alert(1)</script>';
    const known = marks[0]!.name;
    const { report, dir } = await run(expect, 0, {
      marks: MARKS.replace(`\n${known},`, `\n${script},`),
      log: logWith(({ mark }, k) =>
        mark === known ? { mark: script } : k % 40 === 0 ? { mark: `"${script.replace('1', '2')}"` } : {},
      ),
      study: `title: ${script}\n${STUDY}`,
    });
    expect(report).not.toMatch(/<script/i);
    expect(report).toContain('&lt;script&gt;alert(1)&lt;/script&gt;');
    expect(report).toContain('&lt;script&gt;alert(2)&lt;/script&gt;');
    for (const name of readdirSync(join(dir, 'results', 'charts'))) {
      expect(readFileSync(join(dir, 'results', 'charts', name), 'utf8')).not.toMatch(/<script/i);
    }
  });

  it('a log full of ordinary points beside the check shots is told in short', async ({ expect }) => {
    const points = Array.from({ length: 500 }, (_, k) => ({
      ...rows[k % rows.length]!,
      mark: `boundary ${k}`,
    }));
    const { result } = await run(expect, 0, { log: logText([...rows, ...points]) });
    expect(result.rows.setAside).toEqual({ 'unknown-mark': 500 });
    expect(result.messages.filter(({ code }) => code === 'unknown-mark')).toHaveLength(4);
  });
});
