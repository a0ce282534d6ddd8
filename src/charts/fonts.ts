import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { type FontWidths, fontWidths } from './fontWidths.js';

/** Paths of the regular and the bold font that charts are drawn with. */
export function fontFiles(): { readonly regular: string; readonly bold: string } {
  const require = createRequire(import.meta.url);
  const path = (name: string): string => require.resolve(`dejavu-fonts-ttf/ttf/${name}.ttf`);
  return { regular: path('DejaVuSans'), bold: path('DejaVuSans-Bold') };
}

/** Width of a text in pixels as the chart's fonts draw it. */
export type TextWidth = (text: string, fontSizePx: number, bold: boolean) => number;

/** Reads both fonts and gives a function that measures texts. */
export function textWidthReader(): TextWidth {
  const files = fontFiles();
  const [regular, bold] = [memoized(files.regular), memoized(files.bold)];
  return (text, fontSizePx, isBold) => {
    let em = 0;
    for (const character of text) em += (isBold ? bold : regular)(character.codePointAt(0)!);
    return em * fontSizePx;
  };
}

function memoized(file: string): FontWidths {
  const widthOf = fontWidths(readFileSync(file));
  const known = new Map<number, number>();
  return (codePoint) => {
    const width = known.get(codePoint) ?? widthOf(codePoint);
    known.set(codePoint, width);
    return width;
  };
}
