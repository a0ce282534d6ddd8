/** Advance widths of a font, em, by Unicode code point. */
export type FontWidths = (codePoint: number) => number;

/**
 * Reads the advance widths of a TrueType font (OpenType specification: tables `head`, `hhea`, `hmtx`, and `cmap`
 * subtables of format 4 for Unicode on Windows). Kerning is not read: it moves a word by a fraction of a pixel.
 * @param font the bytes of a .ttf file
 * @throws Error when a table is missing
 */
export function fontWidths(font: Uint8Array): FontWidths {
  const view = new DataView(font.buffer, font.byteOffset, font.byteLength);
  const offsetOf = (tag: string): number => {
    for (let i = 0; i < view.getUint16(4); i++) {
      const record = 12 + 16 * i;
      const name = String.fromCharCode(...font.subarray(record, record + 4));
      if (name === tag) return view.getUint32(record + 8);
    }
    throw new Error(`Expected a table "${tag}" in the font, found none.`);
  };
  const unitsPerEm = view.getUint16(offsetOf('head') + 18);
  const metricCount = view.getUint16(offsetOf('hhea') + 34);
  const metrics = offsetOf('hmtx');
  const glyphOf = glyphLookup(view, offsetOf('cmap'));
  return (codePoint) =>
    // glyphs after the last metric share it
    view.getUint16(metrics + 4 * Math.min(glyphOf(codePoint), metricCount - 1)) / unitsPerEm;
}

/** Code point → glyph number by a format 4 subtable; 0, the glyph for what is missing, otherwise. */
function glyphLookup(view: DataView, cmap: number): (codePoint: number) => number {
  const table = unicodeSubtable(view, cmap);
  const segments = view.getUint16(table + 6) / 2;
  const ends = table + 14;
  const starts = ends + 2 * segments + 2;
  const deltas = starts + 2 * segments;
  const rangeOffsets = deltas + 2 * segments;
  return (codePoint) => {
    if (codePoint > 0xffff) return 0;
    let k = 0;
    while (view.getUint16(ends + 2 * k) < codePoint) k++;
    const start = view.getUint16(starts + 2 * k);
    if (start > codePoint) return 0;
    const delta = view.getUint16(deltas + 2 * k);
    const rangeOffset = view.getUint16(rangeOffsets + 2 * k);
    if (rangeOffset === 0) return (codePoint + delta) & 0xffff;
    const glyph = view.getUint16(rangeOffsets + 2 * k + rangeOffset + 2 * (codePoint - start));
    return glyph === 0 ? 0 : (glyph + delta) & 0xffff;
  };
}

function unicodeSubtable(view: DataView, cmap: number): number {
  for (let i = 0; i < view.getUint16(cmap + 2); i++) {
    const record = cmap + 4 + 8 * i;
    const table = cmap + view.getUint32(record + 4);
    // platform 3 is Windows, encoding 1 the Unicode characters up to U+FFFF
    if (view.getUint16(record) === 3 && view.getUint16(record + 2) === 1 && view.getUint16(table) === 4) {
      return table;
    }
  }
  throw new Error('Expected a Unicode subtable of format 4 in the table "cmap" of the font, found none.');
}
