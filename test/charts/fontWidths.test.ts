import { readFileSync } from 'node:fs';
import { Resvg } from '@resvg/resvg-js';
import { describe, expect, it } from 'vitest';
import { fontFiles, textWidthReader } from '../../src/charts/fonts.js';
import { fontWidths } from '../../src/charts/fontWidths.js';

/**
 * Advance width as resvg lays text out: the growth of the drawn box by a hundred repetitions. Not for characters that
 * are kerned against themselves, such as A.
 */
function drawnWidthEm(character: string, bold: boolean): number {
  const { regular, bold: boldFile } = fontFiles();
  const width = (count: number): number => {
    const weight = bold ? 'bold' : 'normal';
    const svg = `<svg xmlns="http://www.w3.org/2000/svg" width="20000" height="200"><text x="50" y="150" font-family="DejaVu Sans" font-weight="${weight}" font-size="100">${character.repeat(count)}</text></svg>`;
    const font = { loadSystemFonts: false, fontFiles: [regular, boldFile], defaultFontFamily: 'DejaVu Sans' };
    return new Resvg(svg, { font }).getBBox()!.width;
  };
  return (width(101) - width(1)) / 10000;
}

describe('widths of the chart fonts', () => {
  it.each(['H', 'i', 'm', '0', '²', '√', 'é', 'ж', '−', '…'])(
    '%s is as wide as resvg draws it',
    (character) => {
      const width = textWidthReader();
      for (const bold of [false, true]) {
        expect(width(character, 1, bold)).toBeCloseTo(drawnWidthEm(character, bold), 3);
      }
    },
  );

  it('adds characters up and scales with the size', () => {
    const width = textWidthReader();
    expect(width('mi', 10, false)).toBeCloseTo(10 * (width('m', 1, false) + width('i', 1, false)), 10);
    expect(width('', 10, false)).toBe(0);
  });

  it('gives characters that the font lacks, or that lie beyond U+FFFF, the width of its missing glyph', () => {
    const widthOf = fontWidths(readFileSync(fontFiles().regular));
    expect(widthOf(0x1f600)).toBe(widthOf(0x4e00));
    expect(widthOf(0x4e00)).toBeGreaterThan(0);
  });

  it('names the table that a broken font lacks', () => {
    expect(() => fontWidths(new Uint8Array(64))).toThrow('Expected a table "head" in the font, found none.');
  });
});
