import { describe, expect, it } from 'vitest';
import { formatMessage, InputError } from '../../src/logs/index.js';
import { parseStudyText } from '../../src/study/parseStudyText.js';

const NEEDED = 'marks: m.csv\nbases: b.csv\nlogs:\n  - files: a.csv\n';
const SHEET = 'horizontal: {constantMm: 8, ppm: 1}, vertical: {constantMm: 15, ppm: 1}';

function mistakes(text: string): string[] {
  try {
    parseStudyText(text, 'study.yaml');
  } catch (error) {
    expect(error).toBeInstanceOf(InputError);
    return (error as InputError).messages.map((message) =>
      formatMessage(message)
        .replace(/^study\.yaml/, '')
        .replace(' error: ', ' '),
    );
  }
  throw new Error(`no mistake was found in ${JSON.stringify(text)}`);
}

/** Mistakes of lines that stand below the needed ones, that is from line 5 on. */
const below = (lines: string): string[] => mistakes(`${NEEDED}${lines}\n`);

describe('a study file', () => {
  it('with the needed keys gets all defaults', () => {
    expect(parseStudyText(NEEDED, 'study.yaml').settings).toEqual({
      title: 'Check shots',
      reportUnits: 'metric',
      showCrews: false,
      coordinates: 'geographic',
      marks: 'm.csv',
      bases: 'b.csv',
      logs: [{ files: 'a.csv' }],
      model: { form: 'root-sum-square', reference: 'auto', confidence: 0.95, screen: true },
      occupations: { gapSeconds: 60 },
      tolerances: [],
      jobs: [],
      checkShots: { falseAlarmsPerYear: 1, checksPerYear: 1000 },
      standards: [],
      fieldTests: [],
      centringSigmaMm: 0,
      terms: [],
      by: [],
      indices: [],
      maps: [],
      leaveOutDays: [],
      seed: 1,
    });
  });

  it('may have a byte-order mark and any line ends', () => {
    const whole = parseStudyText(NEEDED, 'study.yaml').settings;
    expect(parseStudyText(`\ufeff${NEEDED}`, 'study.yaml').settings).toEqual(whole);
    expect(parseStudyText(NEEDED.replaceAll('\n', '\r\n'), 'study.yaml').settings).toEqual(whole);
  });

  it('that is empty lacks the needed keys', () => {
    const missing = [
      ' [marks] Expected a text or keys with values, the key is missing. Add it.',
      ' [bases] Expected a text or keys with values, the key is missing. Add it.',
      ' [logs] Expected a list, the key is missing. Add it.',
    ];
    expect(mistakes('')).toEqual(missing);
    expect(mistakes('# nothing yet\n')).toEqual(missing);
  });

  it('that is no list of keys says what came', () => {
    expect(mistakes('hello')).toEqual([' Expected keys with values, came "hello". Correct it.']);
    expect(mistakes('- a')).toEqual([' Expected keys with values, came ["a"]. Correct it.']);
  });
});

describe('a key', () => {
  it.each([
    ['titel: x', ':5 [titel] The key "titel" is not known. Did you mean "title"? Correct or remove it.'],
    [
      'colour: x',
      ':5 [colour] The key "colour" is not known. Known here: title, surveyor, reportDate, reportUnits, showCrews, timeZone, coordinates, heights, marks, bases, logs, period, model, occupations, tolerances, specSheet, site, jobs, checkShots, standards, fieldTests, centringSigmaMm, terms, by, indices, maps, leaveOutDays, seed. Correct or remove it.',
    ],
    ['4: x', /^:5 \[4\] The key "4" is not known\. Known here: /],
    [
      'model: {confidense: 0.9}',
      ':5 [model.confidense] The key "confidense" is not known. Did you mean "confidence"? Correct or remove it.',
    ],
    [
      'tolerances: [{component: vertical, limitmm: 5, limitMm: 5}]',
      ':5 [tolerances[0].limitmm] The key "limitmm" is not known. Did you mean "limitMm"? Correct or remove it.',
    ],
  ])('misspelt: %s', (line, expected) => {
    const [message, ...more] = below(line);
    expect(more).toEqual([]);
    if (typeof expected === 'string') expect(message).toBe(expected);
    else expect(message).toMatch(expected);
  });

  it('misspelt inside logs and layouts', () => {
    const log = (lines: string) => mistakes(`marks: m.csv\nbases: b.csv\nlogs:\n${lines}\n`);
    expect(log('  - file: a.csv')).toEqual([
      ':4 [logs[0].files] Expected a text or a list, the key is missing. Add it.',
      ':4 [logs[0].file] The key "file" is not known. Did you mean "files"? Correct or remove it.',
    ]);
    expect(log('  - files: a.csv\n    layout: {kind: delimited, columns: {mrk: Point}}')).toEqual([
      ':5 [logs[0].layout.columns.mrk] The key "mrk" is not known. Did you mean "mark"? Correct or remove it.',
    ]);
    expect(log('  - files: a.csv\n    layout: {kind: spreadsheet}')).toEqual([
      ':5 [logs[0].layout.kind] Expected "delimited" or "nmea", came "spreadsheet". Correct it.',
    ]);
    expect(log('  - files: a.csv\n    layout:\n      kind: delimited\n      fixValues: {4: fix}')).toEqual([
      ':7 [logs[0].layout.fixValues.4] Expected "fixed" or "float" or "other", came "fix". Correct it.',
    ]);
  });

  it('missing inside a marks entry is found on the right side of the alternatives', () => {
    expect(mistakes('marks: {fil: m.csv}\nbases: b.csv\nlogs: [{files: a.csv}]\n')).toEqual([
      ':1 [marks.file] Expected a text, the key is missing. Add it.',
      ':1 [marks.fil] The key "fil" is not known. Did you mean "file"? Correct or remove it.',
    ]);
  });
});

describe('a value', () => {
  it.each([
    ['title: 2025', ':5 [title] Expected a text, came 2025. Correct it.'],
    ['title:', ':5 [title] Expected a text, came nothing. Correct it.'],
    ['title: ""', ':5 [title] Expected at least one entry, came "". Correct it.'],
    [
      'timeZone: Mars/Base',
      ':5 [timeZone] Expected an IANA time zone like Europe/Lisbon or an offset from UTC like +02:00, came "Mars/Base". Correct it.',
    ],
    [
      'timeZone: UTC+2',
      ':5 [timeZone] Expected an IANA time zone like Europe/Lisbon or an offset from UTC, which for UTC+2 is written "+02:00", came "UTC+2". Correct it.',
    ],
    ['timeZone: 5', ':5 [timeZone] Expected a text, came 5. Correct it.'],
    ['period: 2025', ':5 [period] Expected keys with values, came 2025. Correct it.'],
    [
      'period: {from: 2025-06-01, to: 2025-05-01}',
      ':5 [period] Expected a first day not after the last, came {"from":"2025-06-01","to":"2025-05-01"}. Correct it.',
    ],
    [
      'period: {from: 2025-3-1, to: 2025-05-01}',
      ':5 [period.from] Expected a day like 2025-03-01, came "2025-3-1". Correct it.',
    ],
    [
      'period: {from: 2025-02-30, to: 2025-05-01}',
      ':5 [period.from] Expected a day that exists, came "2025-02-30". Correct it.',
    ],
    [
      'leaveOutDays: [2025-13-01]',
      ':5 [leaveOutDays[0]] Expected a day that exists, came "2025-13-01". Correct it.',
    ],
    ['leaveOutDays: 2025-03-01', ':5 [leaveOutDays] Expected a list, came "2025-03-01". Correct it.'],
    [
      'heights: {kind: geometric}',
      ':5 [heights.kind] Expected "ellipsoidal" or "orthometric", came "geometric". Correct it.',
    ],
    ['model: {confidence: 95}', ':5 [model.confidence] Expected a number below 1, came 95. Correct it.'],
    ['model: {confidence: 0.5}', ':5 [model.confidence] Expected a number above 0.5, came 0.5. Correct it.'],
    [
      'occupations: {gapSeconds: 0}',
      ':5 [occupations.gapSeconds] Expected a number above 0, came 0. Correct it.',
    ],
    ['seed: 1.5', ':5 [seed] Expected a whole number, came 1.5. Correct it.'],
    ['seed: -1', ':5 [seed] Expected a number of at least 0, came -1. Correct it.'],
    ['seed: .nan', ':5 [seed] Expected a number, came a number without a value. Correct it.'],
    ['seed: .inf', /^:5 \[seed\] Expected .*, came a number without a value\. Correct it\.$/],
    ['tolerances:', ':5 [tolerances] Expected a list, came nothing. Correct it.'],
    [
      'tolerances:\n  - {component: horizontal}',
      ':6 [tolerances[0]] Expected one of limitMm and limitFeet, came {"component":"horizontal"}. Correct it.',
    ],
    [
      'tolerances:\n  - {component: horizontal, limitMm: 5}\n  - {component: vertical, limitMm: 5, limitFeet: 3}',
      ':7 [tolerances[1]] Expected one of limitMm and limitFeet, came {"component":"vertical","limitMm":5,"limitFeet":3}. Correct it.',
    ],
    [
      'tolerances: [{component: plan, limitMm: 5}]',
      ':5 [tolerances[0].component] Expected "horizontal" or "vertical", came "plan". Correct it.',
    ],
    [
      'tolerances: [{component: vertical, limitMm: ten}]',
      ':5 [tolerances[0].limitMm] Expected a number, came "ten". Correct it.',
    ],
    [
      'tolerances: [{component: vertical, limitMm: 0}]',
      ':5 [tolerances[0].limitMm] Expected a number above 0, came 0. Correct it.',
    ],
    [
      'tolerances: [{component: vertical, limitMm: 5, share: 95}]',
      ':5 [tolerances[0].share] Expected a number below 1, came 95. Correct it.',
    ],
    [
      `specSheet: {${SHEET}, axis: radial, level: rms}`,
      ':5 [specSheet.form] Expected "root-sum-square" or "linear-sum", the key is missing. Add it.',
    ],
    [
      `specSheet: {${SHEET}, form: linear-sum, level: rms}`,
      ':5 [specSheet.axis] Expected "radial" or "per-axis", the key is missing. Add it.',
    ],
    [
      `specSheet: {${SHEET}, form: linear-sum, axis: radial}`,
      ':5 [specSheet.level] Expected "68" or "95" or "rms", the key is missing. Add it.',
    ],
    [
      `specSheet: {${SHEET}, form: linear-sum, axis: radial, level: 99}`,
      ':5 [specSheet.level] Expected "68" or "95" or "rms", came 99. Correct it.',
    ],
  ])('%s', (lines, expected) => {
    const found = below(lines);
    expect(found).toHaveLength(1);
    if (typeof expected === 'string') expect(found[0]).toBe(expected);
    else expect(found[0]).toMatch(expected);
  });

  it('of the levels 68 and 95 may be a number or a text', () => {
    for (const level of ['rms', '68', '"68"', '95', '"95"']) {
      const text = `${NEEDED}specSheet: {${SHEET}, form: linear-sum, axis: radial, level: ${level}}\n`;
      expect(String(parseStudyText(text, 's').settings.specSheet!.level)).toBe(level.replaceAll('"', ''));
    }
  });

  it('that is wrong twice is told twice', () => {
    expect(below('seed: x\ntitle: 5')).toHaveLength(2);
  });

  it('that is very long is cut', () => {
    const [message] = below(`timeZone: ${'x'.repeat(5000)}`);
    expect(message!.length).toBeLessThan(250);
  });
});

describe('a decimal comma between braces', () => {
  const tolerance = (limit: string): string[] =>
    mistakes(`${NEEDED}tolerances: [{component: vertical, limitMm: ${limit}}]\n`);
  const TOLD = (key: string): string =>
    `:5 [tolerances[0].${key}] Expected numbers with a decimal point, came the key "${key}" without a value: a decimal comma ends a number here. Write a point,`;

  it('is told as what it is', () => {
    expect(tolerance('30,0')).toEqual([`${TOLD('0')} here limitMm: 30.0.`]);
    expect(tolerance('30,5')).toEqual([`${TOLD('5')} such as 30.5.`]);
    expect(tolerance('30, 5: 1')[0]).toContain('The key "5" is not known.');
  });
});

describe('broken YAML', () => {
  it.each([
    [
      '\ttitle: x\n',
      [':1 The file is not valid YAML: Tabs are not allowed as indentation. Correct the line.'],
    ],
    [
      'a: 1\n\tb: 2\n',
      [':2 The file is not valid YAML: Tabs are not allowed as indentation. Correct the line.'],
    ],
    [
      'marks: m.csv\nmarks: n.csv\n',
      [':2 The file is not valid YAML: Map keys must be unique. Correct the line.'],
    ],
    [
      'marks: m.csv\n---\na: 1\n',
      [':2 The file is not valid YAML: a line of three dashes begins a second document. Correct the line.'],
    ],
    [
      'marks: m.csv\nbases: b.csv\nlogs:\n  - files: *.csv\n',
      [':4 The file is not valid YAML: a text that begins with * needs quotes: "*.csv". Correct the line.'],
    ],
    [
      'marks: {file: m.csv, names: {pattern: "CHK (\\w+) \\w"}}\n',
      [
        ":1 The file is not valid YAML: Invalid escape sequence \\w. Put a pattern or path with backslashes in single quotes, such as 'CHK (\\d+)': between them a backslash is one.",
      ],
    ],
    ['a: 1\n? [b]\n: 1\n', [':2 The file is not valid YAML: a key is not a plain text. Correct the line.']],
  ])('%j', (text, expected) => {
    expect(mistakes(text)).toEqual(expected);
  });

  it('names the line of a quote that does not close, and no more than five lines', () => {
    expect(mistakes(`${NEEDED}title: "a\n`)[0]).toMatch(
      /^:\d+ The file is not valid YAML: Missing closing "quote\./,
    );
    expect(mistakes('{[:\n'.repeat(40)).length).toBeLessThanOrEqual(5);
  });

  it('whose references multiply beyond measure is refused', () => {
    const lines = ['a0: &a0 [x, x]'];
    for (let k = 1; k < 12; k++) lines.push(`a${k}: &a${k} [${`*a${k - 1}, `.repeat(9)}*a${k - 1}]`);
    expect(mistakes(lines.join('\n'))[0]).toMatch(/^ The file is not valid YAML: Excessive alias count/);
  });
});
