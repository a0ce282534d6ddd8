import { mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';
import { describe, expect, it } from 'vitest';
import { basesText, logText, marksText, simulateLog } from '../../src/campaign/index.js';
import type { DailyFactor } from '../../src/days/index.js';
import { readIndices, readTecMaps } from '../../src/ionosphere/index.js';
import { formatMessage, InputError } from '../../src/logs/index.js';
import { readStudy, runStudy, type SkyInput, type StudyRun, skyOfDays } from '../../src/study/index.js';
import { resultsSchema } from '../../src/study/resultsSchema.js';
import { testFolder } from '../files.js';
import { ionexText } from '../ionosphere/ionexText.js';
import { fixtureText } from '../ionosphere/samples.js';

const folder = testFolder();
/** Published values of 2024-01-21 to 2024-02-09 (GFZ Potsdam, CC BY 4.0; test/fixtures/geomag/README.md). */
const KP_FILE = fixtureText('Kp_ap_Ap_SN_F107_sample_2024-01-21_2024-02-09.txt');
const HP_FILE = fixtureText('Hp30_ap30_sample_2025-06-19.txt');

/** Kp 1 to 8 and Ap of a day, straight from the columns of the file. */
function published(day: string): { kp: number[]; ap: number; f107: number } {
  const row = KP_FILE.split('\n').find((line) => line.startsWith(day.replaceAll('-', ' ')))!;
  const cells = row.trim().split(/\s+/).map(Number);
  return { kp: cells.slice(7, 15), ap: cells[23]!, f107: cells[25]! };
}

const campaign = simulateLog({
  seed: 5,
  days: 12,
  startDate: '2024-01-22',
  marks: { count: 6, nearestKm: 0.5, farthestKm: 25 },
  occupationsPerDay: { from: 14, to: 18 },
  noFix: { shareAt1Km: 0.05, shareAt12Km: 0.2 },
});
folder.write('marks.csv', marksText(campaign.marks, { horizontal: 1, vertical: 2 }));
folder.write('bases.csv', basesText([campaign.base]));
folder.write('log.csv', logText(campaign.rows));
folder.write('kp.txt', KP_FILE);
folder.write('hp.txt', HP_FILE);
folder.write('kp.txt.gz', gzipSync(KP_FILE));
folder.write('old.txt.Z', Uint8Array.from([0x1f, 0x9d, 0x90, 1, 2, 3]));
folder.write(
  'noise.txt',
  Uint8Array.from({ length: 300 }, (_, k) => (k * 37 + 11) % 256),
);
folder.write('empty.txt', '');
folder.write('broken.gz', Uint8Array.from([0x1f, 0x8b, 8, 0, 1]));

/** Maps every two hours of a day and midnight after it; TEC grows with latitude and from day to day. */
const mapsText = (day: number, tecu = (latitude: number): number => latitude * 10): string =>
  ionexText(
    Array.from({ length: 13 }, (_, k) => ({
      epoch: k < 12 ? [2024, 1, day, 2 * k, 0, 0] : [2024, 1, day + 1, 0, 0, 0],
      value: (latitude: number) => tecu(latitude),
    })),
    { latitudes: [60, 30, -5], longitudes: [-180, 180, 5] },
  );
folder.write('maps/a.24i', mapsText(22));
folder.write(
  'maps/b.24i',
  mapsText(23, (latitude) => latitude * 10 + 50),
);

const studyText = (lines: string): string =>
  folder.write(
    'study.yaml',
    `marks: marks.csv\nbases: bases.csv\nlogs: [{files: log.csv}]\ntimeZone: UTC\n${lines}\n`,
  );
const run = async (lines: string): Promise<StudyRun> => runStudy(await readStudy(studyText(lines)));
const codes = ({ results }: StudyRun): string[] => results.messages.map(({ code }) => code);

describe('a study with files of the sky', () => {
  it('has the published activity of each day', async () => {
    const { results } = await run('indices: [kp.txt]');
    const sky = results.sky!;
    expect(sky.files).toEqual(['kp.txt']);
    expect(sky.days.map(({ day }) => day)).toHaveLength(results.days);
    for (const { day, kpMax, ap, f107, indexShare, tecMean, mapShare } of sky.days) {
      const { kp, ap: dayAp, f107: flux } = published(day);
      // the file rounds Kp to three decimals
      expect(kpMax, day).toBeCloseTo(Math.max(...kp), 3);
      expect(Math.abs(ap! - dayAp), day).toBeLessThanOrEqual(0.5);
      expect(f107, day).toBe(flux);
      expect([indexShare, tecMean, mapShare]).toEqual([1, null, 0]);
    }
    expect(sky.site).toMatchObject({ base: 'B1' });
    expect(sky.site.latitudeDeg).toBeCloseTo(campaign.base.latitudeDeg, 8);
    expect(resultsSchema.parse(JSON.parse(JSON.stringify(results))).sky).toEqual(sky);
  });

  it('differs from one without them in the sky alone', async () => {
    const [without, withFiles] = [await run(''), await run('indices: [kp.txt]\nmaps: ["maps/*.24i"]')];
    expect(without.results.sky).toBe(null);
    expect(without.results.messages.filter(({ code }) => code === 'no-sky-files')).toHaveLength(1);
    // What the study states and which files it read differ by the keys themselves.
    const rest = ({ results: { sky: _, messages: __, settings: ___, inputs: ____, ...others } }: StudyRun) =>
      others;
    expect(rest(withFiles)).toEqual(rest(without));
    const added = withFiles.results.messages.filter(
      ({ text }) => !without.results.messages.some((one) => one.text === text),
    );
    for (const { code } of added) expect(code).toMatch(/^(index|map|sky)-/);
  });

  it('takes TEC, its gradient and change from the maps at the base', async () => {
    const { results } = await run('maps: [maps/a.24i, maps/b.24i]');
    const [first, second, third] = results.sky!.days;
    const { latitudeDeg } = campaign.base;
    // TEC of 1 TECU a degree of latitude: exponent -1 makes units of 0.1 TECU (IONEX 1.0)
    expect(first!.tecMean).toBeCloseTo(latitudeDeg, 2);
    expect(second!.tecMean).toBeCloseTo(latitudeDeg + 5, 2);
    expect(second!.tecChange).toBeCloseTo(5, 6);
    expect(first!.tecChange).toBe(null);
    // one degree on a shell 450 km above 6371 km
    expect(first!.gradientMean).toBeCloseTo(100 / ((6821 * Math.PI) / 180), 3);
    // a layer at 450 km, mask 15 degrees: −0.0601 ppm per TECU (least squares over a sky full of satellites)
    expect(first!.shorteningPpm! / first!.tecMean!).toBeCloseTo(-0.0601, 4);
    expect(first!.mapShare).toBe(1);
    expect(third).toMatchObject({ tecMean: null, shorteningPpm: null, mapShare: 0, kpMax: null, ap: null });
    const told = results.messages.filter(({ code }) => code === 'map-other-day');
    expect(told).toHaveLength(1);
    const used = campaign.occupations;
    const without = used.filter(({ day }) => day > '2024-01-23').length;
    expect(told[0]!.text).toMatch(
      new RegExp(`^Expected maps for ${used.length} occupations, .*: ${without} of them lie outside`),
    );
    expect(told[0]!.text).toContain('Give the map files of these days.');
  });

  it('reads a packed file as the plain one, and a pattern', async () => {
    const [plain, packed] = [await run('indices: [kp.txt]'), await run('indices: ["kp.txt.gz"]')];
    expect(packed.results.sky!.days).toEqual(plain.results.sky!.days);
    const both = await run('indices: ["kp.tx*"]');
    expect(both.results.sky!.files).toEqual(['kp.txt', 'kp.txt.gz']);
    expect(both.results.sky!.days).toEqual(plain.results.sky!.days);
  });

  it('says what is wrong with files that cannot be used, and goes on', async () => {
    const all = await run(
      'indices: [empty.txt, noise.txt, broken.gz, old.txt.Z, log.csv, kp.txt]\nmaps: [kp.txt]',
    );
    expect(all.results.sky!.files).toEqual(['kp.txt']);
    const of = (file: string): string[] =>
      all.results.messages.filter((told) => told.file === file).map(({ code }) => code);
    expect(of('empty.txt')).toEqual(['index-layout-unknown']);
    expect(of('noise.txt')).toEqual(['index-layout-unknown']);
    expect(of('broken.gz')).toEqual(['sky-file-unreadable']);
    expect(of('old.txt.Z')).toEqual(['sky-file-unreadable']);
    expect(of('kp.txt').length).toBeGreaterThan(0);
    expect(all.results.messages.find(({ file }) => file === 'old.txt.Z')!.text).toBe(
      'Expected a file of indices or maps that can be read, came one packed by "compress". Unpack it and name the unpacked file.',
    );
    const none = await run('indices: [noise.txt]');
    expect(none.results.sky).toBe(null);
    expect(codes(none)).toContain('sky-not-known');
    expect(none.results.fits.length).toBeGreaterThan(0);
  });

  it('says so when the file is of another year', async () => {
    const other = await run('indices: [hp.txt]');
    expect(
      other.results.sky!.days.every(({ ap, kpMax, indexShare }) => [ap, kpMax, indexShare].join() === ',,0'),
    ).toBe(true);
    expect(other.results.sky!.associations).toEqual([]);
    expect(other.results.messages.find(({ code }) => code === 'index-other-period')!.text).toContain(
      'Give the file of the same years',
    );
  });

  it('refuses a study file that names files which are not there', async () => {
    mkdirSync(join(folder.path, 'none'), { recursive: true });
    const reading = readStudy(studyText('indices: [kp.txt, nowhere.txt]\nmaps: [none/*.24i]'));
    const error = await reading.catch((thrown: unknown) => thrown);
    expect(error).toBeInstanceOf(InputError);
    const texts = (error as InputError).messages.map(formatMessage);
    expect(texts).toHaveLength(2);
    expect(texts[0]).toContain('Expected files of indices that match "nowhere.txt"');
    expect(texts[1]).toContain('Expected files of ionosphere maps that match "none/*.24i"');
  });
});

describe('skyOfDays', () => {
  const { indices } = readIndices(KP_FILE, 'kp.txt');
  const days = Array.from({ length: 18 }, (_, k) =>
    new Date(Date.UTC(2024, 0, 22 + k)).toISOString().slice(0, 10),
  );
  const factor = (
    day: string,
    value: number,
    component: DailyFactor['component'] = 'horizontal',
  ): DailyFactor => ({
    component,
    day,
    factor: value,
    low: value / 2,
    high: value * 2,
    probabilityDegraded: 0.1,
    degraded: value >= 10,
    occupations: 40,
  });
  const input = (rest: Partial<SkyInput> = {}): SkyInput => ({
    days,
    timeZone: 'UTC',
    site: { latitudeDeg: 45, longitudeDeg: 8 },
    indices,
    maps: null,
    factors: days.map((day) => factor(day, published(day).ap)),
    visits: [],
    confidence: 0.95,
    seed: 1,
    ...rest,
  });

  it('finds factors that follow Ap, and adjusts for as many comparisons as were made', () => {
    const { associations, messages } = skyOfDays(input());
    expect(associations.map(({ outcome, measure }) => `${outcome}, ${measure}`)).toEqual([
      'horizontal daily factor, Ap',
      'horizontal daily factor, greatest Kp',
      'horizontal daily factor, F10.7',
    ]);
    // the factor is the published Ap, which is the mean of ap rounded: ranks differ in ties alone
    expect(associations[0]!.spearman).toBeGreaterThan(0.98);
    const least = associations.reduce((a, b) => (a.pValue! <= b.pValue! ? a : b));
    // Holm 1979: the least of three p-values is multiplied by three
    expect(least.adjustedPValue).toBeCloseTo(3 * least.pValue!, 12);
    for (const { pValue, adjustedPValue } of associations)
      expect(adjustedPValue).toBeGreaterThanOrEqual(pValue!);
    expect(messages.map(({ code }) => code)).toEqual(['sky-associations']);
    expect(messages[0]!.text).toContain('Of 3 comparisons');
    expect(messages[0]!.text).toContain('horizontal daily factor with Ap');
    expect(messages[0]!.text).toContain('Going together names no cause');
  });

  it('takes the greatest Hp of a day where that is what the files have', () => {
    const hp = skyOfDays(
      input({ days: ['2025-06-19', '2025-06-20'], indices: readIndices(HP_FILE, 'hp').indices }),
    );
    // the greatest of the column Hp30 of each day
    const greatest = ['2025 06 19', '2025 06 20'].map((day) =>
      Math.max(
        ...HP_FILE.split('\n')
          .filter((line) => line.startsWith(day))
          .map((line) => Number(line.trim().split(/\s+/)[7])),
      ),
    );
    expect(greatest.every((value) => value > 0)).toBe(true);
    expect(hp.days.map(({ hpMax, kpMax, indexShare }) => [hpMax, kpMax, indexShare])).toEqual(
      greatest.map((value) => [value, null, 1]),
    );
    expect(skyOfDays(input()).days.every(({ hpMax }) => hpMax === null)).toBe(true);
  });

  it('judges thresholds of Kp only where days could be named', () => {
    const named = skyOfDays(input()).thresholds;
    expect(named.map(({ component, days: count }) => [component, count])).toEqual([['horizontal', 18]]);
    expect(named[0]!.degradedDays).toBe(days.filter((day) => published(day).ap >= 10).length);
    const unnamed = input().factors.map((one) => ({ ...one, degraded: null }));
    expect(skyOfDays(input({ factors: unnamed })).thresholds).toEqual([]);
    expect(skyOfDays(input({ indices: null })).thresholds).toEqual([]);
  });

  it('compares missing fixes where there are visits, by their share of the day', () => {
    const visits = days.flatMap((day, k) =>
      Array.from({ length: 20 }, (_, i) => ({ day, fixedRows: i < k ? 0 : 5 })),
    );
    const found = skyOfDays(input({ factors: [], visits }));
    expect(found.days.map(({ shareWithoutFix }) => shareWithoutFix)).toEqual(days.map((_, k) => k / 20));
    expect(new Set(found.associations.map(({ outcome }) => outcome))).toEqual(
      new Set(['share without a fix']),
    );
    expect(skyOfDays(input({ visits: [] })).days[0]!.shareWithoutFix).toBe(null);
  });

  it('does not depend on the order of factors and visits, and the seed moves only the chance orders', () => {
    const factors = input().factors;
    const [given, turned] = [skyOfDays(input()), skyOfDays(input({ factors: [...factors].reverse() }))];
    expect(turned).toEqual(given);
    const other = skyOfDays(input({ seed: 2 }));
    expect(other.associations.map(({ spearman }) => spearman)).toEqual(
      given.associations.map(({ spearman }) => spearman),
    );
    expect(other.associations.map(({ pValue }) => pValue)).not.toEqual(
      given.associations.map(({ pValue }) => pValue),
    );
  });

  it('gives a change from a day before on which no work was done, when the maps tell of it', () => {
    const text = `${mapsText(22)}`;
    const both = [text, mapsText(23, (latitude) => latitude * 10 + 50)].map(
      (one) => readTecMaps(one, 'maps').maps!,
    );
    const maps = {
      ...both[0]!,
      epochsMs: Float64Array.from([...both[0]!.epochsMs.slice(0, 12), ...both[1]!.epochsMs]),
      tec: [...both[0]!.tec.slice(0, 12), ...both[1]!.tec],
      rms: [...both[0]!.rms.slice(0, 12), ...both[1]!.rms],
      heights: [...both[0]!.heights.slice(0, 12), ...both[1]!.heights],
    };
    const sky = skyOfDays(
      input({ days: ['2024-01-23'], maps, factors: [], site: { latitudeDeg: 45, longitudeDeg: -10 } }),
    );
    expect(sky.days).toHaveLength(1);
    expect(sky.days[0]!.tecChange).toBeCloseTo(5, 6);
  });
});
