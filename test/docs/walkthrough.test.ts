import { spawnSync } from 'node:child_process';
import { copyFileSync, existsSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { emptyFolder, REPOSITORY } from '../cli/ppmwise.js';

/**
 * The five steps of the README as a new user takes them: its commands, one after another, in an empty folder, with a log
 * in a layout that nobody told of (other words for columns, decimal commas, local time, the mark in a remark).
 */
const readme = readFileSync(join(REPOSITORY, 'README.md'), 'utf8');
const steps = readme
  .slice(readme.indexOf('## Your own data in five steps'), readme.indexOf('`npx ppmwise demo try`'))
  .split(/^\d\. /m)
  .slice(1)
  .map((step) => [...step.matchAll(/^ {7}(\S.*)$/gm)].map(([, command]) => command!));
const folder = emptyFolder();
const study = join(folder, 'my-study');

interface Shown {
  readonly status: number | null;
  readonly text: string;
}

/** Runs a command of the README in the shell. `npm pack` builds before; here it must not, while other tests use the build. */
function shell(command: string, cwd: string): Shown {
  const { status, stdout, stderr } = spawnSync('sh', ['-c', command.replace('/path/to', folder)], {
    cwd,
    encoding: 'utf8',
    env: {
      ...process.env,
      npm_config_ignore_scripts: 'true',
      npm_config_yes: 'true',
      npm_config_prefer_offline: 'true',
    },
  });
  return { status, text: stdout + stderr };
}

/** The demo's days on the pillar, as a controller of another make would have written them. */
function strangeLog(): string {
  const text = ['2025-03', '2025-04'].map((month) =>
    readFileSync(join(REPOSITORY, `datasets-demo/logs/${month}.csv`), 'utf8'),
  );
  const [head, ...rows] = text
    .flatMap((log, i) =>
      log
        .trimEnd()
        .split('\n')
        .slice(i === 0 ? 0 : 1),
    )
    .map((line) => line.split(','));
  const at = (row: readonly string[], name: string): string => row[head!.indexOf(name)]!;
  const lines = rows
    .filter((row) => at(row, 'base') === 'PILLAR' && at(row, 'time') < '2025-04-08')
    .map((row) => {
      const local = new Date(Date.parse(at(row, 'time')) - 3_600_000).toISOString();
      const [date, time] = [local.slice(0, 10).split('-').reverse().join('.'), local.slice(11, 19)];
      const [latitude, longitude, height] = ['latitude', 'longitude', 'height'].map((name) =>
        at(row, name).replace('.', ','),
      );
      return [
        '17',
        latitude,
        longitude,
        height,
        `CHK ${at(row, 'mark')} ok`,
        date,
        time,
        at(row, 'fix') === 'fixed' ? 'FIX' : 'FLT',
      ].join(';');
    });
  return `${['Ptn;Breite;Laenge;h [m];Bemerkung;Tag;Uhr;Loesung', ...lines].join('\n')}\n`;
}

const ANSWERS = `logs:
  - files: logs/*.txt
    layout:
      kind: delimited
      decimal: comma
      columns: {latitude: Breite, longitude: Laenge, description: Bemerkung, date: Tag, timeOfDay: Uhr, fix: Loesung}
      time: {format: dd.MM.yyyy HH:mm:ss, zone: Etc/GMT+1}
      fixValues: {FIX: fixed, FLT: float}
`;

describe('the five steps of the README', () => {
  it('lead from an empty folder to a printed rule', ({ skip }) => {
    expect(steps.map((commands) => commands.length)).toEqual([4, 0, 1, 1, 1]);
    const [pack, make, enter, install] = steps[0] as [string, string, string, string];
    expect(shell(`${pack} --pack-destination ${folder}`, REPOSITORY).status).toBe(0);
    const made = shell(make, folder);
    skip(/ENOTCACHED|ENOTFOUND|ECONNREFUSED|EAI_AGAIN/.test(made.text), 'npm reaches no registry');
    expect(made.text).toContain('The study is in ');
    expect(enter).toBe('cd my-study');
    expect(shell(install, study).status).toBe(0);

    for (const name of ['marks.csv', 'bases.csv']) copyFileSync(join(study, 'demo', name), join(study, name));
    const bases = readFileSync(join(study, 'bases.csv'), 'utf8').split('\n');
    writeFileSync(join(study, 'bases.csv'), bases.filter((line) => !line.startsWith('YARD')).join('\n'));
    writeFileSync(join(study, 'logs/season.txt'), strangeLog());
    const layout = shell(steps[2]![0]!, study);
    for (const asked of [
      'is the latitude?',
      'In which zone are the times written?',
      'mean fixed, float or other?',
      'column "Bemerkung"',
    ])
      expect(layout.text).toContain(asked);

    const yaml = readFileSync(join(study, 'study.yaml'), 'utf8');
    const before = yaml
      .slice(0, yaml.indexOf('logs:\n'))
      .replace(/^marks: marks.csv$/m, 'marks: {file: marks.csv, names: {pattern: "CHK (\\\\w+)"}}');
    writeFileSync(
      join(study, 'study.yaml'),
      before + ANSWERS + yaml.slice(yaml.indexOf('\n# What your clients demand')),
    );
    const checked = shell(steps[3]![0]!, study);
    expect(checked.text).toMatch(/Occupations: 1\W\d{3} formed, 1\W\d{3} used/);
    expect(checked.status).toBe(0);

    const run = shell(steps[4]![0]!, study);
    expect(run.status).toBe(0);
    expect(run.text).toMatch(
      /Up to [\d.]+\u00a0km from the base: 95\u00a0% of horizontal positions within 25\u00a0mm/,
    );
    expect(existsSync(join(study, 'results/report.html'))).toBe(true);
  }, 600_000);
});
