import { mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { formatMessage, InputError } from '../../src/logs/index.js';
import { readStudy } from '../../src/study/index.js';
import { testFolder } from '../files.js';

const folder = testFolder();
folder.write('marks.csv', 'mark,latitude,longitude,height\nCP1,47,8,500\n');
folder.write('bases.csv', 'base,latitude,longitude,height\nB1,47,8,500\n');
for (const name of ['b', 'a', 'day (1)', '[x]']) folder.write(`logs/${name}.csv`, 'time\n');

const study = (lines: string) =>
  readStudy(folder.write('study.yaml', `marks: marks.csv\nbases: bases.csv\n${lines}\n`));

async function mistakes(reading: Promise<unknown>): Promise<string[]> {
  const error = await reading.then(
    () => null,
    (thrown: unknown) => thrown,
  );
  expect(error).toBeInstanceOf(InputError);
  return (error as InputError).messages.map((message) =>
    formatMessage(message).replaceAll(folder.path, 'DIR').replace('DIR/study.yaml', ''),
  );
}

const filesOf = async (patterns: string) =>
  (await study(`logs:\n  - files: ${patterns}`)).logs.map(({ file }) => file);

describe('readStudy', () => {
  it('fills in every default', async () => {
    const read = await study('logs:\n  - files: logs/a.csv');
    expect(read).toEqual({
      file: join(folder.path, 'study.yaml'),
      folder: folder.path,
      title: 'Check shots',
      surveyor: null,
      reportDate: null,
      reportUnits: 'metric',
      showCrews: false,
      timeZone: null,
      heightKind: 'ellipsoidal',
      marks: {
        path: join(folder.path, 'marks.csv'),
        file: 'marks.csv',
        coordinates: 'geographic',
        changes: {},
      },
      bases: {
        path: join(folder.path, 'bases.csv'),
        file: 'bases.csv',
        coordinates: 'geographic',
        changes: {},
      },
      siteMarks: [],
      logFrames: [],
      broughtToOneFrame: false,
      constantSeparation: false,
      namePattern: null,
      aliases: null,
      markTimes: new Map(),
      logs: [
        {
          path: join(folder.path, 'logs/a.csv'),
          file: 'logs/a.csv',
          layout: { kind: 'delimited' },
          coordinates: 'geographic',
          nearestMarkM: null,
          marksByTime: false,
          changes: {},
        },
      ],
      messages: [],
      period: null,
      gapSeconds: 60,
      windowSeconds: null,
      form: 'root-sum-square',
      reference: 'auto',
      confidence: 0.95,
      screen: true,
      tolerances: [],
      specSheet: null,
      siteHeightDifferenceM: null,
      jobs: [],
      checkShots: { falseAlarmsPerYear: 1, checksPerYear: 1000 },
      standards: [],
      fieldTests: [],
      geoidGrids: [],
      stated: expect.arrayContaining([{ key: 'logs[0].files', value: 'logs/a.csv' }]),
      centringSigmaMm: 0,
      terms: [],
      by: [],
      indices: [],
      maps: [],
      leaveOutDays: [],
      seed: 1,
    });
  });

  it('finds logs by pattern, list or name, in order and each once', async () => {
    const all = ['logs/[x].csv', 'logs/a.csv', 'logs/b.csv', 'logs/day (1).csv'];
    expect(await filesOf('logs/*.csv')).toEqual(all);
    expect(await filesOf('"**/[ab].csv"')).toEqual(['logs/a.csv', 'logs/b.csv']);
    expect(await filesOf('[logs/b.csv, logs/*.csv]')).toEqual([
      'logs/b.csv',
      ...all.filter((f) => f !== 'logs/b.csv'),
    ]);
    expect(await filesOf(JSON.stringify(join(folder.path, 'logs/*.csv')))).toEqual(all);
  });

  it('finds a file whose name holds characters of a pattern', async () => {
    expect(await filesOf('"logs/day (1).csv"')).toEqual(['logs/day (1).csv']);
    expect(await filesOf('"logs/[x].csv"')).toEqual(['logs/[x].csv']);
  });

  it('understands limits of jobs in feet', async () => {
    folder.write('job.csv', 'point,latitude,longitude\nP,47,8\n');
    const { jobs } = await study(
      'logs: [{files: logs/a.csv}]\njobs: [{file: job.csv, limitFeet: 0.1}, {file: job.csv, limitMm: 20}, job.csv]',
    );
    expect(jobs.map(({ limitMm }) => limitMm)).toEqual([0.1 * 304.8, 20, null]);
  });
  it('understands feet: one foot is 304.8 mm', async () => {
    const { tolerances } = await study(
      'logs: [{files: logs/a.csv}]\ntolerances: [{component: vertical, limitFeet: 0.1}, {component: horizontal, limitMm: 25}]',
    );
    expect(tolerances[0]!.limitMm).toBeCloseTo(30.48, 10);
    expect(tolerances[1]).toEqual({
      component: 'horizontal',
      limitMm: 25,
      share: 0.95,
      dayShare: 0.9,
      confidence: 0.95,
    });
  });

  it('lets marks, bases and logs have coordinates of their own', async () => {
    const utm = '+proj=utm +zone=32 +ellps=WGS84';
    const read = await readStudy(
      folder.write(
        'study.yaml',
        `coordinates: ${utm}\nmarks: {file: marks.csv, coordinates: geographic, columns: {mark: Point}}\nbases: bases.csv\nlogs: [{files: logs/a.csv, coordinates: geocentric}]\n`,
      ),
    );
    expect(read.marks).toMatchObject({ coordinates: 'geographic', columns: { mark: 'Point' } });
    expect(read.bases.coordinates).toBe(utm);
    expect(read.logs[0]!.coordinates).toBe('geocentric');
  });
});

describe('mistakes of a study', () => {
  it('a study file that is not there, or is a folder', async () => {
    expect(await mistakes(readStudy(join(folder.path, 'nowhere.yaml')))).toEqual([
      'DIR/nowhere.yaml error: Expected a study file, came a path that does not exist. Name the file, or make one with "ppmwise new DIR".',
    ]);
    expect((await mistakes(readStudy(folder.path)))[0]).toContain('came a folder.');
  });

  it('files that are not there, all at once, with their lines', async () => {
    mkdirSync(join(folder.path, 'empty'), { recursive: true });
    const text = [
      'marks: mark.csv',
      'bases: {file: empty}',
      'logs:',
      '  - files: [logs/a.csv, "empty/*.csv"]',
      '  - files: logs',
    ];
    expect(await mistakes(readStudy(folder.write('study.yaml', text.join('\n'))))).toEqual([
      ':1 [marks] error: Expected the marks file "mark.csv" in the folder of the study file, there is none. Create it or correct the name.',
      ':2 [bases.file] error: Expected the bases file "empty" in the folder of the study file, there is none. Create it or correct the name.',
      ':4 [logs[0].files] error: Expected log files that match "empty/*.csv" in the folder of the study file, there are none. Put the exported logs there or correct the pattern, such as "logs/*.csv".',
      ':5 [logs[1].files] error: Expected log files that match "logs" in the folder of the study file, there are none. Put the exported logs there or correct the pattern, such as "logs/*.csv".',
    ]);
  });

  it('coordinates that nobody knows, told once where they stand', async () => {
    const unknown = (key: string, row: number) => [
      expect.stringMatching(
        new RegExp(
          `^:${row} \\[${key}\\] error: Expected "geographic", "geocentric", an EPSG code or a proj string, came "`,
        ),
      ),
    ];
    const logs = 'logs: [{files: logs/a.csv}]';
    expect(await mistakes(study(`coordinates: geografic\n${logs}`))).toEqual(unknown('coordinates', 3));
    expect(await mistakes(study(`coordinates: +proj=utn +zone=32\n${logs}`))).toEqual(
      unknown('coordinates', 3),
    );
    expect(await mistakes(study('logs:\n  - files: logs/a.csv\n    coordinates: EPSG:1'))).toEqual(
      unknown('logs\\[0\\]\\.coordinates', 5),
    );
  });

  it('of the text itself', async () => {
    expect(await mistakes(study('logs: [{files: logs/a.csv}]\ntitel: x'))).toEqual([
      ':4 [titel] error: The key "titel" is not known. Did you mean "title"? Correct or remove it.',
    ]);
  });
});

describe('the demo study', () => {
  it('is read', async () => {
    const path = fileURLToPath(new URL('../../datasets-demo/study.yaml', import.meta.url));
    const { logs, tolerances, timeZone, specSheet } = await readStudy(path);
    expect(logs.map(({ file }) => file)).toEqual([
      'logs/2025-03.csv',
      'logs/2025-04.csv',
      'logs/2025-05.csv',
    ]);
    expect(tolerances).toHaveLength(4);
    expect(timeZone).toBe('Etc/GMT+1');
    expect(specSheet!.level).toBe('rms');
  });
});
