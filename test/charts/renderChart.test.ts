import { Resvg } from '@resvg/resvg-js';
import { describe, expect, it } from 'vitest';
import {
  type ChartSpec,
  errorByBaselineChart,
  markMapChart,
  markMeansChart,
  renderPng,
  renderSvg,
} from '../../src/charts/index.js';
import type { MarkMean } from '../../src/split/index.js';
import { fewRows, fullInput, manyRows } from './data.js';

const errorChart = (rows = fewRows()): ChartSpec => errorByBaselineChart(fullInput(rows, 'horizontal', 25));

const hostile: MarkMean = {
  mark: '<script>alert("1")</script>&',
  base: '"B" & <b>',
  baselineKm: 3,
  azimuthDeg: 40,
  occupations: 9,
  days: 4,
  east: 1,
  north: 2,
  up: 3,
  se: { east: 1, north: 1, up: 1 },
};

describe('renderSvg', () => {
  it('gives the same bytes again, also when charts are drawn at the same time', async () => {
    const [points, heat] = [errorChart(), errorChart(manyRows())];
    const alone = await renderSvg(points);
    const together = await Promise.all([heat, points, heat, points].map((chart) => renderSvg(chart)));
    expect(together[1]).toBe(alone);
    expect(together[3]).toBe(alone);
    expect(together[2]).toBe(together[0]);
  });

  it('carries its title and its description', async () => {
    const chart = errorChart();
    const svg = await renderSvg(chart);
    expect(svg).toMatch(/^<svg role="img" [^>]*><title>/);
    expect(svg).toContain(`<title>${chart.title}</title><desc>${chart.description}</desc>`);
    // one picture with one description, not hundreds of things to step through
    expect(svg.match(/role=/g)).toHaveLength(1);
    expect(svg).not.toContain('aria-');
  });

  it('keeps the ids of different charts in one page apart, and every reference has its id', async () => {
    const drawn = await Promise.all([errorChart(), errorChart(manyRows())].map((chart) => renderSvg(chart)));
    const idsOf = (svg: string): string[] => [...svg.matchAll(/ id="([^"]+)"/g)].map(([, id]) => id!);
    const [first, second] = drawn.map(idsOf) as [string[], string[]];
    expect(first.length).toBeGreaterThan(0);
    expect(first.filter((id) => second.includes(id))).toEqual([]);
    for (const svg of drawn) {
      for (const [, id] of svg.matchAll(/url\(#([^)]+)\)/g)) expect(idsOf(svg)).toContain(id);
    }
  });

  it('escapes names from logs in texts, title and description', async () => {
    const charts = [
      markMapChart({ marks: [hostile], baseName: hostile.base }),
      markMeansChart({ marks: [hostile] }),
    ];
    for (const chart of charts) {
      const svg = await renderSvg(chart);
      expect(svg).not.toContain('<script');
      expect(svg).not.toContain('<b>');
      expect(svg).toContain('&lt;script&gt;alert(');
      // a parser of XML takes it
      expect(new Resvg(svg).width).toBeGreaterThan(100);
    }
  });

  it('survives control characters, which XML forbids', async () => {
    const svg = await renderSvg(markMeansChart({ marks: [{ ...hostile, mark: 'M\u0007\u0000\u001b1' }] }));
    // biome-ignore lint/suspicious/noControlCharactersInRegex: they are what must not be there
    expect(svg).not.toMatch(/[\u0000-\u0008\u000b\u000c\u000e-\u001f]/);
    expect(new Resvg(svg).width).toBeGreaterThan(100);
  });

  it('does not cut long names', async () => {
    const mark = 'a very long name of a mark that goes on and on beyond any sensible width';
    expect(await renderSvg(markMeansChart({ marks: [{ ...hostile, mark }] }))).toContain(`${mark}, 3.0 km`);
  });

  it('stops at a warning instead of drawing something else', async () => {
    const chart = errorChart();
    const odd = {
      ...chart,
      vegaLite: { ...chart.vegaLite, layer: [{ mark: 'bar', encoding: { nonsense: { field: 'x' } } }] },
    };
    await expect(renderSvg(odd)).rejects.toThrow('The chart cannot be drawn as specified: ');
  });
});

describe('renderPng', () => {
  it('draws in the size of the SVG times the scale, with text, the same bytes again', async () => {
    const chart = markMeansChart({ marks: [{ ...hostile, mark: 'M1', base: 'B1' }] });
    const svg = await renderSvg(chart);
    const width = Number(/ width="(\d+)"/.exec(svg)![1]);
    const png = await renderPng(chart);
    expect(png.subarray(1, 4).toString()).toBe('PNG');
    // the header of a PNG holds its width at byte 16 (ISO/IEC 15948)
    expect(png.readUInt32BE(16)).toBe(2 * width);
    expect((await renderPng(chart, 1)).readUInt32BE(16)).toBe(width);
    expect(await renderPng(chart)).toEqual(png);
    const withoutText = new Resvg(svg, {
      font: { loadSystemFonts: false },
      fitTo: { mode: 'zoom', value: 2 },
    });
    expect(png.length).toBeGreaterThan(1.5 * withoutText.render().asPng().length);
  });
});
