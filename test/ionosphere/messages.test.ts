import { describe, expect, it } from 'vitest';
import {
  type GeomagneticIndices,
  joinIndices,
  joinMaps,
  mergeIndices,
  outsideMapsNote,
  readIndices,
  readTecMaps,
} from '../../src/ionosphere/index.js';
import type { Message } from '../../src/logs/index.js';
import { exponentLine, ionexLines, ionexText, type MapText } from './ionexText.js';
import { fixtureText } from './samples.js';

/*
 * Messages about indices and maps, gathered from bad inputs, keep the grammar of all messages: full sentences, a code in
 * lower case, a place only with a file, and what to do.
 */
const DAILY = fixtureText('Kp_ap_Ap_SN_F107_sample_2024-01-21_2024-02-09.txt');
const rows = DAILY.split('\n').filter((line) => /^\d/.test(line));
const map = (hour: number, more: Partial<MapText> = {}): MapText => ({
  epoch: [2025, 3, 1, hour, 0, 0],
  value: () => 100,
  ...more,
});
const lines = ionexLines([map(0), map(2), map(0, { kind: 'RMS' })]);

const indexTexts = [
  '',
  'x',
  DAILY,
  ...rows.slice(0, 6).map((row, i) => [row.slice(0, 10 + 20 * i), ...rows.slice(3, 9)].join('\n')),
  rows.map((row) => row.replace('2024 02', '2023 02')).join('\n'),
  [rows[0], rows[0]!.replace('178.5', '99'), rows[4], 'DST'.padEnd(120, '9')].join('\n'),
  [rows[0]!.replace('   4     4  -1', '   4    44  -1'), rows[1]].join('\n'),
];
const mapTexts = [
  '',
  'x',
  ...lines.map((_, i) => lines.slice(0, i).join('\n')),
  ...lines.map((_, i) => lines.filter((__, k) => k !== i).join('\n')),
  ...lines.map((_, i) => lines.map((line, k) => (k === i ? '?'.repeat(80) : line)).join('\n')),
  ionexText([map(0), map(0), map(6), map(7, { kind: 'HEIGHT' })], { mapCount: 9 }),
  ionexText([map(0, { before: () => [exponentLine(1)] }), map(2, { value: () => 9999 })]),
];

function allMessages(): Message[] {
  const indices = indexTexts.map((text) => readIndices(text, 'kp.txt'));
  const maps = mapTexts.map((text) => readTecMaps(text, 'm.25i'));
  const known: GeomagneticIndices[] = indices.map((reading) => reading.indices);
  const good = maps.flatMap((reading) => (reading.maps === null ? [] : [reading.maps]));
  const times = [Number.NaN, Date.UTC(2024, 0, 20, 23), Date.UTC(2024, 0, 22), Date.UTC(2030, 0, 1)];
  return [
    ...indices.flatMap(({ messages }) => messages),
    ...maps.flatMap(({ messages }) => messages),
    ...mergeIndices(known).messages,
    ...joinMaps(good).messages,
    ...joinMaps([good[0]!, { ...good[0]!, shellHeightKm: 350 }]).messages,
    ...times.flatMap((ms) => [
      ...known.flatMap((one) => joinIndices([{ startMs: ms }], one).messages),
      outsideMapsNote(good[0]!, [ms])!,
    ]),
  ];
}

describe('every message about indices and maps', () => {
  const all = allMessages();
  const offenders = (holds: (message: Message) => boolean): string[] => [
    ...new Set(all.filter((one) => !holds(one)).map(({ code, text }) => `${code}: ${text}`)),
  ];

  it('is of many kinds here', () => {
    expect(new Set(all.map(({ code }) => code)).size).toBeGreaterThan(20);
    expect(offenders(({ code }) => /^[a-z0-9]+(-[a-z0-9]+)*$/.test(code))).toEqual([]);
  });

  it('is full sentences, at least two, without slips of a program', () => {
    expect(offenders(({ text }) => /^[\p{Lu}\d"]/u.test(text) && text.endsWith('.'))).toEqual([]);
    expect(offenders(({ text }) => text.split(/[.?] /).length >= 2)).toEqual([]);
    const slip = /undefined|\[object|\bNaN\b|\bnull\b|\bInfinity\b| {2}(?!.*")|\.\.|\s\.|"":/;
    expect(offenders(({ text }) => !slip.test(text.replace(/"[^"]*"/g, '"x"')))).toEqual([]);
    expect(offenders(({ text }) => text.length <= 600)).toEqual([]);
  });

  it('has a place only with a file', () => {
    expect(offenders(({ file, row }) => file !== null || row === null)).toEqual([]);
    expect(offenders(({ row }) => row === null || (Number.isInteger(row) && row >= 1))).toEqual([]);
  });

  it('that is an error says what came', () => {
    expect(offenders(({ severity, text }) => severity !== 'error' || /\bcame\b|missing/.test(text))).toEqual(
      [],
    );
  });
});
