import { localToUtc, parseIsoTime } from '../time/index.js';
import { type CoordinateColumns, CoordinateFault } from './coordinateColumns.js';
import type { DelimitedRow } from './delimited.js';
import type { DelimitedHeader } from './header.js';
import { quoted } from './messages.js';
import { parseNumber } from './numbers.js';
import type { Fix, Position } from './position.js';
import type { SetAsideRow } from './reasons.js';
import type { ColumnRole } from './roles.js';

/** A covariate that could not be read: the row is used without it, and this is told. */
export interface CellFault {
  readonly row: number;
  readonly column: string;
  readonly cell: string;
}

/** What one row came to: a position, or the reason why there is none. */
export type RowOutcome =
  | {
      readonly kind: 'position';
      readonly position: Position;
      readonly faults: readonly CellFault[];
      /** The cell of the fix column when nobody has said what it means. */
      readonly unknownFix: string | null;
    }
  | { readonly kind: 'set-aside'; readonly row: SetAsideRow };

export interface PositionReaderOptions {
  readonly file: string;
  readonly header: DelimitedHeader;
  readonly coordinates: CoordinateColumns;
  readonly timeZone: string | null;
  /** Text of the fix column, lower case → meaning. */
  readonly fixValues: ReadonlyMap<string, Fix>;
}

const NO_FAULTS: readonly CellFault[] = [];

/** A function that turns data rows of one file into positions. */
export function positionReader(options: PositionReaderOptions): (row: DelimitedRow) => RowOutcome {
  const { file, header, coordinates, timeZone, fixValues } = options;
  const at = (role: ColumnRole): number => header.positions.get(role) ?? -1;
  const name = (role: ColumnRole): string => header.headers.get(role) ?? role;
  const [firstAt, secondAt, thirdAt] = coordinates.roles.map(at) as [number, number, number];
  const columns = {
    time: at('time'),
    mark: at('mark'),
    base: at('base'),
    setup: at('setup'),
    rover: at('rover'),
    crew: at('crew'),
    fix: at('fix'),
  };
  const covariates = (['satellites', 'pdop', 'ageSeconds', 'horizontalSigma', 'verticalSigma'] as const).map(
    (role) => ({ index: at(role), column: name(role) }),
  );

  return ({ row, cells, fault }) => {
    const unreadable = (column: string | null, detail: string): RowOutcome => ({
      kind: 'set-aside',
      row: { file, row, reason: 'unreadable', column, detail },
    });
    if (cells === null) return unreadable(null, fault);
    const text = (index: number): string => (index < 0 ? '' : cells[index]!);

    const time = readTime(text(columns.time), timeZone);
    if (typeof time === 'string') return unreadable(name('time'), time);

    const numbers: number[] = [];
    for (const [k, index] of [firstAt, secondAt, thirdAt].entries()) {
      const value = parseNumber(text(index));
      if (value === null) {
        return unreadable(name(coordinates.roles[k]!), notANumber(text(index)));
      }
      numbers.push(value);
    }
    let [latitudeDeg, longitudeDeg, heightM] = numbers as [number, number, number];
    const blank = numbers.filter((value) => Number.isNaN(value)).length;
    if (blank > 0) latitudeDeg = longitudeDeg = heightM = Number.NaN;
    else {
      try {
        ({ latitudeDeg, longitudeDeg, heightM } = coordinates.toGeodetic(latitudeDeg, longitudeDeg, heightM));
      } catch (error) {
        if (!(error instanceof CoordinateFault)) throw error;
        return unreadable(name(coordinates.roles[error.index]), error.message);
      }
    }

    let faults = NO_FAULTS;
    const values = covariates.map(({ index, column }) => {
      const value = parseNumber(text(index));
      if (value !== null) return value;
      faults = [...faults, { row, column, cell: text(index) }];
      return Number.NaN;
    }) as [number, number, number, number, number];

    const fixText = text(columns.fix).toLowerCase();
    const fix = columns.fix < 0 ? 'fixed' : fixValues.get(fixText);
    const position: Position = {
      file,
      row,
      utcMs: time,
      mark: text(columns.mark),
      base: text(columns.base),
      setup: text(columns.setup),
      rover: text(columns.rover),
      crew: text(columns.crew),
      fix: fix ?? 'other',
      latitudeDeg,
      longitudeDeg,
      heightM,
      satellites: values[0],
      pdop: values[1],
      ageSeconds: values[2],
      horizontalSigmaM: values[3],
      verticalSigmaM: values[4],
    };
    const unknownFix = fix === undefined && blank === 0 ? text(columns.fix) : null;
    return { kind: 'position', position, faults, unknownFix };
  };
}

function notANumber(cell: string): string {
  const comma = /^[-+]?\d+,\d+$/.test(cell) ? ' with a decimal comma; export with decimal points' : '';
  return `expected a number, came ${quoted(cell)}${comma}`;
}

/** Satellite positioning is not older, and the tables of time zones reach farther. */
const FIRST_YEAR = 1980;
const LAST_YEAR = 2099;
const FIRST_MS = Date.UTC(FIRST_YEAR, 0, 1);
const END_MS = Date.UTC(LAST_YEAR + 1, 0, 1);

/** UTC milliseconds, or what is wrong with the text. */
function readTime(text: string, timeZone: string | null): number | string {
  const time = parseIsoTime(text);
  const came = `came ${quoted(text)}`;
  const ms = time.kind === 'instant' ? time.utcMs : time.kind === 'local' ? time.wallMs : FIRST_MS;
  if (ms < FIRST_MS || ms >= END_MS) {
    return `expected a time in the years ${FIRST_YEAR} to ${LAST_YEAR}, ${came}`;
  }
  if (time.kind === 'instant') return time.utcMs;
  if (time.kind === 'date') return `expected a date with a time of day like 2025-03-01T10:15:00Z, ${came}`;
  if (time.kind === 'invalid') return `expected a time like 2025-03-01T10:15:00Z, ${came}`;
  if (timeZone === null) {
    return `expected a time with Z or an offset, ${came}; name the timeZone of such times in the study file`;
  }
  const utc = localToUtc(timeZone, time.wallMs);
  if (utc.kind === 'one') return utc.utcMs;
  return utc.kind === 'gap'
    ? `expected a time that exists in ${timeZone}, ${came}, which the change of clocks skips`
    : `expected a time that is unique in ${timeZone}, ${came}, which the change of clocks repeats; write an offset`;
}
