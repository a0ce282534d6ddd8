import { beforeAll, describe, expect, it } from 'vitest';
import { basesText, logText, marksText, simulateLog } from '../src/campaign/index.js';
import { InputError, type Message } from '../src/logs/index.js';
import { readStudy, runStudy } from '../src/study/index.js';
import { testFolder } from './files.js';

/*
 * The grammar of messages: full sentences, each with what was expected, what came and what to do. Messages are gathered
 * from many bad inputs; every one of them is held to it.
 */

const folder = testFolder();
const { marks, base, rows } = simulateLog({
  seed: 6,
  days: 5,
  marks: { count: 4, nearestKm: 0.5, farthestKm: 12 },
  occupationsPerDay: { from: 6, to: 9 },
  noFix: { shareAt1Km: 0.1, shareAt12Km: 0.2 },
  unknownMarkShare: 0.1,
  duplicateRowShare: 0.1,
});
const LOG = logText(rows);
const MARKS = marksText(marks, { horizontal: 1, vertical: 2 });
const BASES = basesText([base]);
const STUDY =
  'marks: marks.csv\nbases: bases.csv\nlogs: [{files: log.csv}]\ntolerances: [{component: horizontal, limitMm: 25}]\n';

interface Input {
  readonly log?: string | Uint8Array;
  readonly marks?: string;
  readonly bases?: string;
  readonly study?: string;
}

const [header, first] = LOG.split('\n') as [string, string];
const line = (index: number, cell: string): string => {
  const cells = first.split(',');
  cells[index] = cell;
  return cells.join(',');
};

const logs: readonly (string | Uint8Array)[] = [
  '',
  `${header}\n`,
  LOG,
  LOG.slice(LOG.indexOf('\n') + 1),
  LOG.slice(0, -50),
  LOG.replace('latitude', 'lattitude'),
  LOG.replace('latitude', 'mark'),
  LOG.replace('pdop', 'p.d.o.p.'),
  LOG.replaceAll(',fixed,', ',4,'),
  LOG.replaceAll(',fixed,', ',,'),
  LOG.replaceAll(',fixed,', ',float,'),
  LOG.replaceAll(',', ';').replaceAll('.', ','),
  LOG.replaceAll('Z,', ','),
  logText(rows.map((row) => ({ ...row, heightM: row.heightM + 47 }))),
  logText(rows.map((row) => ({ ...row, latitudeDeg: row.longitudeDeg, longitudeDeg: row.latitudeDeg }))),
  logText(rows.slice(0, 3)),
  logText(rows.map((row) => ({ ...row, mark: marks[0]!.name }))),
  [
    header,
    first,
    line(7, '900'),
    first,
    'time,mark',
    ...Array.from({ length: 12 }, (_, k) => line(k, 'x')),
  ].join('\n'),
  [header, ...Array.from({ length: 12 }, (_, k) => line(k, '')), line(0, '3000-01-01T00:00:00Z')].join('\n'),
  [header, line(5, '123'), line(6, '-999'), line(7, '1e300'), `${first},more`, '"', 'a\u0000b'].join('\n'),
  [header, ...Array.from({ length: 50 }, (_, k) => line(2, `point ${k}`)), line(1, 'B-1')].join('\n'),
  Buffer.from(LOG, 'utf16le'),
  Buffer.from(LOG.replaceAll(marks[0]!.name, 'Mühle'), 'latin1'),
  Uint8Array.from({ length: 3000 }, (_, k) => (k * k * 31 + 7 * k + 200) % 256),
];

const markFiles: readonly string[] = [
  '',
  'mark,latitude,longitude,height\n',
  'name,lat,lon,h\nA,1,2,3\n',
  MARKS.replace(/\n[^,]+,/, '\n,'),
  MARKS.replace(/(\n[^,]+),[^,]+,/, '$1,,'),
  MARKS.replace(/(\n[^,]+),[^,]+,/, '$1,91,'),
  MARKS.replace(/(\n[^,]+),[^,]+,/, '$1,abc,'),
  `${MARKS}${MARKS.split('\n')[1]}\nshort,1\nX,,,,,,,\n`,
  MARKS.replace(/(\n[^,]+,[^,]+,[^,]+,)[^,]+/, '$11000'),
];

const baseFiles: readonly string[] = [
  '',
  'base,latitude,longitude,height\n',
  BASES.replace('pillar', 'roof'),
  BASES.replace(/,[^,]+,pillar/, ',,pillar'),
  BASES.replace('B1', 'B2'),
  `${BASES}B2,44,-18,100,\n`,
];

const studies: readonly string[] = [
  '',
  'hello',
  '\ta: 1',
  'a: [1',
  '? [a]\n: 1',
  'marks: *x',
  STUDY.replace('log.csv', '*.csv'),
  STUDY.replace('marks.csv', 'mark.csv'),
  STUDY.replace('log.csv', 'logs/*.csv'),
  STUDY.replace('tolerances', 'tolerance'),
  ...[
    'title: 5',
    'timeZone: Nowhere',
    'coordinates: mars',
    'coordinates: +proj=utm',
    'coordinates: geocentric',
    'period: {from: 2025-06-01, to: 2025-05-01}',
    'period: {from: 2030-06-01, to: 2030-07-01}',
    'leaveOutDays: [2025-02-30]',
    'leaveOutDays: [2020-01-01, 2025-03-03]',
    'model: {confidence: 95}',
    'occupations: {gapSeconds: -1}',
    'specSheet: {form: x}',
    'seed: .inf',
    'heights: {kind: orthometric}',
    'timeZone: Europe/Lisbon',
  ].map((text) => `${STUDY}${text}\n`),
];

const inputs: readonly Input[] = [
  ...logs.map((log) => ({ log })),
  ...markFiles.map((text) => ({ marks: text })),
  ...baseFiles.map((text) => ({ bases: text })),
  ...studies.map((study) => ({ study })),
];

async function messagesOf(input: Input): Promise<readonly Message[]> {
  folder.write('marks.csv', input.marks ?? MARKS);
  folder.write('bases.csv', input.bases ?? BASES);
  folder.write('log.csv', input.log ?? LOG);
  const path = folder.write('study.yaml', input.study ?? STUDY);
  try {
    return (await runStudy(await readStudy(path))).results.messages;
  } catch (error) {
    if (error instanceof InputError) return error.messages;
    throw error;
  }
}

describe('every message', () => {
  const all: Message[] = [];

  beforeAll(async () => {
    for (const input of inputs) {
      const messages = await messagesOf(input);
      // Nothing bad passes in silence; the plain log among the inputs has unknown marks to tell of.
      expect(messages.length, JSON.stringify(input).slice(0, 300)).toBeGreaterThan(0);
      all.push(...messages);
    }
    all.push(
      ...((await readStudy('nowhere.yaml').catch((error: InputError) => error.messages)) as Message[]),
    );
  });

  const offenders = (holds: (message: Message) => boolean): string[] => [
    ...new Set(all.filter((message) => !holds(message)).map(({ code, text }) => `${code}: ${text}`)),
  ];

  it('is of many kinds here', () => {
    const codes = new Set(all.map(({ code }) => code));
    expect(codes.size).toBeGreaterThan(30);
    for (const code of codes) expect(code).toMatch(/^[a-z0-9]+(-[a-z0-9]+)*$/);
  });

  it('is one or more sentences: a capital, a digit or a quote first, a full stop last', () => {
    expect(offenders(({ text }) => /^[\p{Lu}\d"]/u.test(text) && text.endsWith('.'))).toEqual([]);
  });

  it('holds no slips of a program', () => {
    const slip = /undefined|\[object|(?<!")\bNaN\b|\bnull\b|\bInfinity\b| {2}|\.\.|\s\.|"":/;
    expect(offenders(({ text }) => !slip.test(text))).toEqual([]);
  });

  it('is short enough to be read', () => {
    expect(offenders(({ text }) => text.length <= 600)).toEqual([]);
  });

  it('has a severity, and a place only with a file', () => {
    expect(offenders(({ severity }) => ['error', 'warning', 'info'].includes(severity))).toEqual([]);
    expect(offenders(({ file, row }) => file !== null || row === null)).toEqual([]);
    expect(offenders(({ row }) => row === null || (Number.isInteger(row) && row >= 1))).toEqual([]);
  });

  it('that is an error says what came and what to do', () => {
    const errors = offenders(
      ({ severity, text }) =>
        severity !== 'error' || /\bcame\b|"|is missing|valid YAML|No occupation/.test(text),
    );
    expect(errors).toEqual([]);
    const remedies = offenders(
      ({ severity, text }) => severity !== 'error' || text.split(/[.?] /).length >= 2,
    );
    expect(remedies).toEqual([]);
  });
});
