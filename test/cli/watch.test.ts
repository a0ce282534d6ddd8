import { cpSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { beforeAll, describe, expect, it } from 'vitest';
import { atPointer, otherWords, pageNumbers } from '../report/numbers.js';
import { emptyFolder, ppmwise, REPOSITORY } from './ppmwise.js';

/*
 * The demo study, fitted to its days up to 18 April and watched with those after. The same days with heights that are
 * 50 mm up and down by turns must give an alarm of the constant.
 */

const folder = emptyFolder();
const study = join(folder, 'study');
const results = join(folder, 'results');

beforeAll(() => {
  cpSync(join(REPOSITORY, 'datasets-demo'), study, { recursive: true });
  const text = readFileSync(join(study, 'study.yaml'), 'utf8');
  // Without tolerances and spec sheet the run is short: watching needs neither.
  const short = text.replace(/^tolerances:\n( {2}- .*\n)*/m, '').replace(/^specSheet:.*\n/m, '');
  writeFileSync(join(study, 'first.yaml'), short.replace('to: 2025-05-02', 'to: 2025-04-18'));
  expect(ppmwise(['run', join(study, 'first.yaml'), '--out', results]).code).toBe(0);
});

describe('ppmwise watch', () => {
  it('explains itself', () => {
    const { code, out } = ppmwise(['watch', '--help']);
    expect(code).toBe(0);
    expect(out).toContain('fit again');
  });

  it('holds new days against the model and looks at no old one', () => {
    const { out } = ppmwise(['watch', join(results, 'results.json'), join(study, 'study.yaml'), '--json']);
    const { watches } = JSON.parse(out) as {
      watches: { component: string; days: { day: string }[]; alarms: unknown[] }[];
    };
    expect(watches.map(({ component }) => component)).toEqual(['horizontal', 'vertical']);
    for (const { days } of watches) {
      expect(days.length).toBeGreaterThan(5);
      expect(days.every(({ day }) => day > '2025-04-18')).toBe(true);
    }
  });

  it('writes a page of the month, every number of which stands in watch.json', () => {
    const month = join(folder, 'month');
    const call = ['watch', join(results, 'results.json'), join(study, 'study.yaml'), '--out', month];
    const { code, out } = ppmwise(call);
    expect(code).toBe(0);
    expect(out).toContain('month.html');
    const page = readFileSync(join(month, 'month.html'), 'utf8');
    const json = JSON.parse(readFileSync(join(month, 'watch.json'), 'utf8'));
    const numbers = pageNumbers(page);
    expect(numbers.length).toBeGreaterThan(100);
    for (const { attributes } of numbers) {
      const place = attributes.get('data-at')!;
      expect(Number(attributes.get('value')), place).toBe(atPointer(json, place));
    }
    const sections = ['verdict', 'crews', 'set-aside', 'moved', 'next', 'marks', 'new-days'];
    const places = sections.map((id) => page.indexOf(`<section id="${id}">`));
    expect(places).toEqual([...places].sort((a, b) => a - b));
    expect(places[0]).toBeGreaterThan(0);
    expect(page).toContain('the model may stay');
    expect(otherWords(page)).not.toMatch(/undefined|NaN|null|\[object|harbour|ridge/);
    // The earlier run knew these days as outside of its period: what lies in them is new.
    const { rowsSetAside, nextMarks, messagesToldBefore } = json.month;
    expect(rowsSetAside.map(({ reason }: { reason: string }) => reason)).toContain('not-fixed');
    expect(nextMarks).toHaveLength(3);
    expect(messagesToldBefore).toBeGreaterThan(3);
    const next = readFileSync(join(month, 'tables', 'next-marks.csv'), 'utf8');
    expect(next.split('\n')).toHaveLength(5);
    expect(readFileSync(join(month, 'month.md'), 'utf8')).toMatch(/^# New days: Check shots, spring 2025\n/);
    // The page is written anew over its own kind, and into nothing else.
    expect(ppmwise(call).code).toBe(0);
    expect(ppmwise([...call.slice(0, 4), study]).err).toContain('Name another folder with --out.');
  });

  it('says that it is time to fit again when heights got worse', () => {
    const log = join(study, 'logs/2025-05.csv');
    const late = join(study, 'logs/2025-04.csv');
    for (const file of [log, late]) {
      const [header, ...rows] = readFileSync(file, 'utf8').trimEnd().split('\n');
      const at = header!.split(',').indexOf('height');
      const worse = rows.map((row) => {
        const cells = row.split(',');
        if (cells[0]! < '2025-04-19' || cells[at] === '') return row;
        // Whole occupations up or down: rows of one mark within an hour are alike.
        const up = (cells[2]!.charCodeAt(3) + Number(cells[0]!.slice(11, 13))) % 2 === 0 ? 0.05 : -0.05;
        cells[at] = (Number(cells[at]) + up).toFixed(4);
        return cells.join(',');
      });
      writeFileSync(file, `${[header, ...worse].join('\n')}\n`);
    }
    const { code, out } = ppmwise(['watch', join(results, 'results.json'), join(study, 'study.yaml')]);
    expect(code).toBe(1);
    expect(out).toMatch(/Vertical: \d+ new days, \d+ of them outside/);
    expect(out).toContain('errors near the base are larger than the model says');
  });

  it('refuses what is no result', () => {
    const { code, err } = ppmwise(['watch', join(study, 'study.yaml'), join(study, 'study.yaml')]);
    expect(code).toBe(2);
    expect(err).toContain('Expected a results.json, came a file that is no JSON.');
  });
});
