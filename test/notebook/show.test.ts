import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { table } from 'arquero';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { simulateErrors } from '../../src/campaign/index.js';
import { type ChartSpec, markMeansChart } from '../../src/charts/index.js';
import { fitErrorModel, formatFit } from '../../src/fit/index.js';
import { show } from '../../src/notebook/index.js';
import { ruleSentence } from '../../src/report/index.js';
import { maximumBaseline } from '../../src/rule/index.js';

interface Sent {
  readonly data: Record<string, string>;
  readonly metadata: Record<string, { width: number; height: number }>;
}

const chart = (): ChartSpec =>
  markMeansChart({
    marks: [
      {
        mark: 'M1',
        base: 'B1',
        baselineKm: 3,
        azimuthDeg: 40,
        occupations: 9,
        days: 4,
        east: 1,
        north: 2,
        up: 3,
        se: { east: 1, north: 1, up: 1 },
      },
    ],
  });

const rows = (count: number): object[] =>
  Array.from({ length: count }, (_, i) => ({ mark: `M${i + 1}`, occupations: i, east: i / 3 }));

afterEach(() => {
  vi.restoreAllMocks();
});

describe('show in a terminal', () => {
  const written = async (what: Parameters<typeof show>[0]): Promise<string> => {
    const write = vi.spyOn(process.stdout, 'write').mockReturnValue(true);
    await show(what);
    return write.mock.calls.map(([text]) => String(text)).join('');
  };

  it('writes tables in columns, numbers to the right with the same decimals', async () => {
    const text = await written([
      { mark: 'M1', occupations: 9, east: 1.23456 },
      { mark: 'M12', occupations: 104, east: -12.5 },
    ]);
    expect(text).toBe(
      ['mark  occupations    east', 'M1              9    1.23', 'M12           104  -12.50', ''].join('\n'),
    );
  });

  it('writes an arquero table as it writes the same records', async () => {
    const records = await written([{ a: 1, b: 'x' }]);
    vi.restoreAllMocks();
    expect(await written(table({ a: [1], b: ['x'] }))).toBe(records);
  });

  it('cuts after 20 rows and says how many more there are', async () => {
    const lines = (await written(rows(55))).trimEnd().split('\n');
    expect(lines).toHaveLength(22);
    expect(lines.at(-1)).toBe('… 35 more rows');
    vi.restoreAllMocks();
    expect(await written(rows(21))).toContain('… 1 more row\n');
    vi.restoreAllMocks();
    expect(await written(rows(20))).not.toContain('more');
    vi.restoreAllMocks();
    expect(await written([])).toBe('no rows\n');
  });

  it('writes estimates with their limits, nested records as columns, and what is missing as a dash', async () => {
    const text = await written([
      { rms: { estimate: 8.12345, low: 7, high: 9.5 }, se: { east: 0.1, up: null }, p: 0.00001, day: null },
      { rms: { estimate: 8, low: null, high: null }, se: { east: Number.NaN, up: 2 }, p: 0.5, day: 'a' },
    ]);
    expect(text.split('\n').map((line) => line.split(/ {2,}/).filter((cell) => cell !== ''))).toEqual([
      ['rms', 'se.east', 'se.up', 'p', 'day'],
      ['8.123 (7.000 to 9.500)', '0.1', '–', '0.00001', '–'],
      ['8.000', '–', '2', '0.5', 'a'],
      [],
    ]);
  });

  it('writes texts as they are, and of a chart what it says', async () => {
    expect(await written('a mm + b ppm')).toBe('a mm + b ppm\n');
    vi.restoreAllMocks();
    const { title, description } = chart();
    const text = await written(chart());
    expect(text).toContain(title);
    expect(text).toContain(description);
  });

  it('refuses what it cannot show', async () => {
    await expect(show(7 as unknown as string)).rejects.toThrow(
      'Expected a chart, a fit, a rule, a table, records or a text to show, came 7.',
    );
    await expect(show(undefined as unknown as string)).rejects.toThrow('came undefined.');
  });
});

describe('show of a rule and of other results', () => {
  const { rows: errors } = simulateErrors({ seed: 3, days: 30 });
  const model = fitErrorModel(errors, { component: 'horizontal', screen: false });
  const tolerance = {
    component: 'horizontal',
    limitMm: 25,
    share: 0.95,
    dayShare: 0.9,
    confidence: 0.95,
  } as const;
  const rule = maximumBaseline(errors, model, tolerance);
  const written = async (what: Parameters<typeof show>[0]): Promise<string> => {
    const write = vi.spyOn(process.stdout, 'write').mockReturnValue(true);
    await show(what);
    return write.mock.calls.map(([text]) => String(text)).join('');
  };

  it('writes the sentence of a rule, the lengths, the conditions and every remark', async () => {
    const text = await written(rule);
    expect(text.split('\n')[0]).toBe(ruleSentence(rule));
    expect(text).toMatch(/^maximum baseline, km +\d/m);
    expect(text).toContain(`${errors.length} occupations on 30 days`);
    for (const remark of rule.remarks) expect(text).toContain(remark);
  });
  it('writes a rule that is none with its reason', async () => {
    const few = errors.slice(0, 40);
    const none = maximumBaseline(
      few,
      fitErrorModel(few, { component: 'horizontal', screen: false }),
      tolerance,
    );
    expect(none.maximumBaselineKm).toBeNull();
    expect(await written(none)).toContain(none.reason);
  });
  it('writes any other result as keys and values, long lists by their count', async () => {
    const text = await written({
      limitMm: 25,
      constant: { estimate: 8, low: 7, high: 9 },
      se: { east: 1, north: 2 },
      marks: ['A', 'B'],
      failures: [{ day: 'a' }, { day: 'b' }],
      days: new Map([['a', 1]]),
      reason: null,
    });
    expect(text.split('\n').map((line) => line.trim().replace(/ {2,}/, '|'))).toEqual([
      'value',
      'limitMm|25',
      'constant|8 (7 to 9)',
      'se.east|1',
      'se.north|2',
      'marks|A, B',
      'failures|2 entries',
      'days|1 entry',
      'reason|–',
      '',
    ]);
  });
});

describe('show in a cell of a notebook', () => {
  const mainScript = process.argv[1]!;
  let folder = '';
  let sent: Sent[] = [];
  let kernel: { lastWriteDisplayData: ((content: Sent, update: boolean) => void) | null };

  beforeEach(() => {
    // a kernel is found where the main script would find it: beside itself
    folder = mkdtempSync(join(tmpdir(), 'kernel-'));
    mkdirSync(join(folder, 'node_modules/tslab/dist'), { recursive: true });
    writeFileSync(join(folder, 'node_modules/tslab/dist/jupyter.js'), 'exports.lastWriteDisplayData = null;');
    process.argv[1] = join(folder, 'run-notebook.cjs');
    kernel = createRequire(process.argv[1])('tslab/dist/jupyter.js');
    sent = [];
    kernel.lastWriteDisplayData = (content, update) => {
      expect(update).toBe(false);
      sent.push(content);
    };
  });

  afterEach(() => {
    process.argv[1] = mainScript;
    rmSync(folder, { recursive: true });
  });

  it('sends a chart once, as a picture with its size and as words', async () => {
    await show(chart());
    expect(sent).toHaveLength(1);
    const { data, metadata } = sent[0]!;
    expect(Object.keys(data)).toEqual(['image/png', 'text/plain']);
    const png = Buffer.from(data['image/png']!, 'base64');
    expect(png.subarray(1, 4).toString()).toBe('PNG');
    expect(metadata['image/png']!.width).toBe(png.readUInt32BE(16) / 2);
    expect(data['text/plain']).toContain(chart().title);
  });

  it('sends a table as HTML with numbers to the right, and as text', async () => {
    await show(rows(55));
    const { data } = sent[0]!;
    expect(Object.keys(data)).toEqual(['text/html', 'text/plain']);
    expect(data['text/html']).toMatch(/<td style="text-align: right;[^"]*">0\.333<\/td>/);
    expect(data['text/html']).toMatch(/<td style="text-align: left;[^"]*">M20<\/td>/);
    expect(data['text/html']).not.toContain('M21');
    expect(data['text/html']).toContain('<p>… 35 more rows</p>');
    expect(data['text/plain']).toContain('… 35 more rows');
  });

  it('escapes names of columns and values', async () => {
    await show([{ '<i>': '<script>alert("1")</script>&' }]);
    const html = sent[0]!.data['text/html']!;
    expect(html).not.toContain('<script');
    expect(html).not.toContain('<i>');
    expect(html).toContain('&lt;script&gt;alert(&quot;1&quot;)&lt;/script&gt;&amp;');
    expect(html).toContain('&lt;i&gt;');
  });

  it('sends a fit as HTML and as text', async () => {
    const { rows: errors } = simulateErrors({ seed: 2, days: 9 });
    const model = fitErrorModel(
      errors.map((row) => ({ ...row, mark: `<${row.mark}>` })),
      { component: 'horizontal' },
    );
    await show(model);
    const { data } = sent[0]!;
    expect(Object.keys(data)).toEqual(['text/html', 'text/plain']);
    expect(data['text/plain']).toBe(formatFit(model));
    expect(data['text/html']).toContain('<b>Horizontal error model, radial RMS</b>');
    expect(data['text/html']).toContain(`${model.ppm.low!.toFixed(2)} to ${model.ppm.high!.toFixed(2)}</td>`);
    expect(data['text/html']).not.toContain('<M');
  });

  it('sends texts as paragraphs, which break between words, and as they are', async () => {
    await show('a < 8 mm\nb ppm');
    expect(sent).toHaveLength(1);
    expect(sent[0]!.data['text/plain']).toBe('a < 8 mm\nb ppm');
    expect(sent[0]!.data['text/html']).toBe(
      '<p style="margin: 2px 0">a &lt; 8 mm</p>\n<p style="margin: 2px 0">b ppm</p>',
    );
  });

  it('writes to the terminal when the kernel runs no cell', async () => {
    kernel.lastWriteDisplayData = null;
    const write = vi.spyOn(process.stdout, 'write').mockReturnValue(true);
    await show('quiet');
    expect(write).toHaveBeenCalledWith('quiet\n');
    expect(sent).toEqual([]);
  });
});
