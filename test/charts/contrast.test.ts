import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { COLORS, OCHRE_TEXT, QUIET_INK } from '../../src/charts/theme.js';
import { PAGE_STYLE } from '../../src/report/style.js';
import { contrastOnWhite } from './contrast.js';

/* Web Content Accessibility Guidelines 2.1, success criteria 1.4.3 (text, 4.5) and 1.4.11 (graphics, 3). */

describe('contrast on white', () => {
  it('is reckoned as the guidelines define it', () => {
    // Black on white is 21; the grey #767676 is the lightest that passes for text (both well known).
    expect(contrastOnWhite('#000000')).toBeCloseTo(21, 10);
    expect(contrastOnWhite('#767676')).toBeGreaterThan(4.5);
    expect(contrastOnWhite('#777777')).toBeLessThan(4.5);
  });
  it('is enough for every colour of text on pages and charts', () => {
    const ofPages = [...PAGE_STYLE.matchAll(/--(ink|quiet|water|brick): (#[0-9a-f]{6});/g)];
    expect(ofPages).toHaveLength(4);
    const { ink, water, brick } = COLORS;
    for (const color of [ink, water, brick, QUIET_INK, OCHRE_TEXT, ...ofPages.map(([, , color]) => color!)])
      expect(contrastOnWhite(color), color).toBeGreaterThanOrEqual(4.5);
  });
  it('is enough for every line and symbol', () => {
    for (const color of [COLORS.ochre, COLORS.moss]) expect(contrastOnWhite(color)).toBeGreaterThanOrEqual(3);
  });
  it('holds for the letters of all charts: none is written in the ochre of lines', () => {
    const folder = new URL('../../src/charts/', import.meta.url);
    const sources = readdirSync(folder).map((name) => readFileSync(new URL(name, folder), 'utf8'));
    const texts = sources.flatMap((source) =>
      [...source.matchAll(/\{ type: 'text'[^}]*\}/g)].map(([mark]) => mark),
    );
    expect(texts.length).toBeGreaterThan(10);
    for (const mark of texts) expect(mark).not.toMatch(/COLORS\.(ochre|moss|mist)/);
  });
});
