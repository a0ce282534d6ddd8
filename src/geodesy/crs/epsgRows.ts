import { EPSG_CONVERSIONS, EPSG_FRAMES } from './epsgTable.js';

/** What the table says of one code. */
export interface EpsgRow {
  readonly code: number;
  readonly kind: 'geographic' | 'geocentric' | 'projected';
  readonly name: string;
  readonly frame: string;
  /** Parameters that give the ellipsoid, e.g. `ellps=GRS80`. */
  readonly shape: string;
  /** Metres between this frame's origin and that of WGS 84, as the register states; null: it states none. */
  readonly originShiftM: number | null;
  /** Parameters of the map projection; empty where there is none. */
  readonly conversion: string;
}

let rows: ReadonlyMap<number, EpsgRow> | undefined;

/** All rows by code; the table is taken apart when first asked for. */
export function epsgRows(): ReadonlyMap<number, EpsgRow> {
  rows ??= readRows();
  return rows;
}

function readRows(): ReadonlyMap<number, EpsgRow> {
  const conversions = linesOf(EPSG_CONVERSIONS);
  const read = new Map<number, EpsgRow>();
  for (const line of linesOf(EPSG_FRAMES)) {
    const [frame = '', shape = '', shift = '', runs = ''] = line.split('|');
    const common = { frame, shape, originShiftM: shift === '' ? null : Number(shift) };
    for (const run of runs.split(' ')) {
      const [codes = '', what = ''] = run.split(':');
      const [first = '', last = first] = codes.split('-');
      for (let code = Number(first); code <= Number(last); code += 1) {
        if (what === 'g' || what === 'c')
          read.set(code, { ...common, code, ...bare(frame, what === 'g' ? 'geographic' : 'geocentric') });
        else {
          const text = conversions[Number(what) + code - Number(first)] ?? '';
          const bar = text.indexOf('|');
          const name = text.startsWith('=') ? text.slice(1, bar) : `${frame} / ${text.slice(0, bar)}`;
          read.set(code, { ...common, code, kind: 'projected', name, conversion: text.slice(bar + 1) });
        }
      }
    }
  }
  return read;
}

function bare(
  frame: string,
  kind: 'geographic' | 'geocentric',
): Pick<EpsgRow, 'kind' | 'name' | 'conversion'> {
  return { kind, name: frame, conversion: '' };
}

function linesOf(text: string): readonly string[] {
  return text.trim().split('\n');
}
