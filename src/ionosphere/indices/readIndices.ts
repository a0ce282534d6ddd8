import { type Message, message, quoted } from '../../logs/index.js';
import { counted } from '../words.js';
import { gfzDaily } from './gfzDaily.js';
import { gfzIntervals } from './gfzInterval.js';
import type { IndexLayout } from './indexLine.js';
import type { GeomagneticIndices } from './indexSeries.js';
import { SeriesBuilder } from './seriesBuilder.js';
import { seriesNotes } from './seriesNotes.js';
import { wdcDst } from './wdcDst.js';
import { wdcKp } from './wdcKp.js';

const LAYOUTS: readonly IndexLayout[] = [gfzDaily, ...gfzIntervals, wdcDst, wdcKp];

/** So many rows settle the layout of a file. */
const ROWS_LOOKED_AT = 200;

/** What the text of an index file holds. */
export interface IndexReading {
  readonly indices: GeomagneticIndices;
  /** In words; null when no known layout was recognised. */
  readonly layout: string | null;
  readonly rowsRead: number;
  /** Rows whose values were taken; the others are told in messages. */
  readonly rowsUsed: number;
  readonly messages: readonly Message[];
}

/**
 * Reads geomagnetic and solar indices out of the text of one public file. The layout is recognised from the rows:
 * the daily and the interval files of GFZ Potsdam (Kp, ap, Ap, sunspot number, F10.7; Hp30, Hp60), and the fixed
 * columns of the world data centres for Kp and for Dst. Rows beginning with # are comments. Missing values stay
 * missing (NaN), times are UTC.
 * @param file its name in messages
 */
export function readIndices(text: string, file: string): IndexReading {
  const lines = text.replace(/^\uFEFF/, '').split(/\r\n|\n|\r/);
  const rows = [...lines.keys()].filter((i) => !/^\s*(#|$)/.test(lines[i]!));
  const layout = layoutOf(rows.slice(0, ROWS_LOOKED_AT).map((i) => lines[i]!));
  if (layout === null) return notRecognised(lines[rows[0] ?? -1], rows.length, file);
  const builder = new SeriesBuilder();
  const notes = new RowNotes(file);
  let rowsUsed = 0;
  for (const i of rows) {
    const line = lines[i]!;
    const fault = layout.read(
      line,
      (name, startMs, value, status) => builder.add(name, startMs, value, status),
      (detail) => notes.add('index-inconsistent', i + 1, detail),
    );
    if (fault === null) {
      rowsUsed += 1;
      continue;
    }
    const other = layout.matches(line) ? undefined : LAYOUTS.find((one) => one.matches(line));
    if (other === undefined) notes.add(fault.code, i + 1, fault.detail);
    else notes.add('index-layouts-mixed', i + 1, `expected ${layout.words}, came a row of ${other.words}`);
  }
  const built = builder.build();
  return {
    indices: { series: built.series },
    layout: layout.words,
    rowsRead: rows.length,
    rowsUsed,
    messages: [...notes.messages(), ...seriesNotes(built, file)],
  };
}

/** The layout of most rows, so that a truncated first row does not decide. */
function layoutOf(rows: readonly string[]): IndexLayout | null {
  let best: IndexLayout | null = null;
  let most = 0;
  for (const layout of LAYOUTS) {
    const count = rows.filter((line) => layout.matches(line)).length;
    if (count <= most) continue;
    most = count;
    best = layout;
  }
  return best;
}

function notRecognised(first: string | undefined, rowsRead: number, file: string): IndexReading {
  const came = first === undefined ? 'a file without any row' : `rows such as ${quoted(first)}`;
  const known = LAYOUTS.map(({ words }) => words).join('; ');
  return {
    indices: { series: {} },
    layout: null,
    rowsRead,
    rowsUsed: 0,
    messages: [
      message(
        'error',
        'index-layout-unknown',
        `Expected a public file of geomagnetic indices (${known}), came ${came}. Give one of these files as it was published.`,
        { file },
      ),
    ],
  };
}

const LEFT_OUT = ['is left out', 'are left out'] as const;

/** What is said of one row and of several, and what to do. */
const ROW_WORDS = {
  'index-row-unreadable': { is: LEFT_OUT, remedy: 'Get the file again, or complete the row.' },
  'index-date-mismatch': { is: LEFT_OUT, remedy: 'Its day is in doubt: get the file again.' },
  'index-layouts-mixed': { is: LEFT_OUT, remedy: 'Give each file by itself.' },
  'index-inconsistent': {
    is: ['contradicts itself', 'contradict themselves'],
    remedy: 'The values are used as they stand: compare the row with the published file.',
  },
} as const;
type RowCode = keyof typeof ROW_WORDS;

/** One message for all rows with the same kind of finding, at the place of the first. */
class RowNotes {
  readonly #found = new Map<RowCode, { readonly row: number; readonly detail: string; rows: Set<number> }>();

  constructor(readonly file: string) {}

  add(code: RowCode, row: number, detail: string): void {
    const found = this.#found.get(code);
    if (found === undefined) this.#found.set(code, { row, detail, rows: new Set([row]) });
    else found.rows.add(row);
  }

  messages(): Message[] {
    return [...this.#found].map(([code, { row, detail, rows }]) => {
      const { is, remedy } = ROW_WORDS[code];
      const which = `${counted(rows.size, 'row')} ${is[rows.size === 1 ? 0 : 1]}`;
      return message('warning', code, `${which}, here: ${detail}. ${remedy}`, { file: this.file, row });
    });
  }
}
