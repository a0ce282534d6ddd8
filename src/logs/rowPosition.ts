import { metresPer } from '../geodesy/index.js';
import type { CoordinateChanges } from './coordinateChanges.js';
import type { CoordinateColumns } from './coordinateColumns.js';
import { fieldBasePlace } from './fieldBasePlace.js';
import type { DelimitedHeader } from './header.js';
import { type DelimitedLayout, decimalCharacter, resolvedUnits } from './layout.js';
import { quoted } from './messages.js';
import type { Corrections, Fix, Position } from './position.js';
import type { RowReason, SetAsideRow } from './reasons.js';
import type { ColumnRole } from './roles.js';
import type { RowCells } from './rowCells.js';
import { extrasReader } from './rowExtras.js';
import { coordinateReader, numberReaders } from './rowNumbers.js';
import { timePlan } from './timePlan.js';

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

export interface RowPositionOptions {
  readonly file: string;
  readonly header: DelimitedHeader;
  readonly layout: DelimitedLayout;
  readonly coordinates: CoordinateColumns;
  readonly timeZone: string | null;
  /** Text of the fix column, lower case → meaning. */
  readonly fixValues: ReadonlyMap<string, Fix>;
  /** Text of the corrections column, lower case → meaning. */
  readonly correctionValues: ReadonlyMap<string, Corrections>;
  /** What is done to the coordinates of the log, and so to those of its base; default nothing. */
  readonly changes?: CoordinateChanges | undefined;
  /** Values that stand in no column, by role: constants, and what the file name gives. */
  readonly values: Readonly<Partial<Record<ColumnRole, string>>>;
}

const NO_FAULTS: readonly CellFault[] = [];
const COVARIATES = [
  'satellites',
  'pdop',
  'ageSeconds',
  'horizontalSigma',
  'verticalSigma',
  'epochs',
] as const;

/**
 * A function that turns data rows of one file into positions.
 * @throws Error for a time format or zone that is not understood
 */
export function rowPosition(options: RowPositionOptions): (row: number, cells: RowCells) => RowOutcome {
  const { file, header, layout, coordinates, fixValues, correctionValues, values } = options;
  const at = (role: ColumnRole): number => header.positions.get(role) ?? -1;
  const name = (role: ColumnRole): string => header.headers.get(role) ?? role;
  const has = (role: ColumnRole): boolean => header.positions.has(role) || values[role] !== undefined;
  const textOf = (role: ColumnRole, cells: RowCells): string =>
    cells.uniqueText(at(role)) || (values[role] ?? '');
  const decimal = decimalCharacter(layout.decimal);
  const numberReader = numberReaders(at, values, decimal);
  const time = timePlan(has, textOf, numberReader, layout.time ?? {}, options.timeZone);
  const textReader = (role: ColumnRole): ((cells: RowCells) => string) => {
    const [index, value] = [at(role), values[role] ?? ''];
    return index < 0 ? () => value : (cells) => cells.text(index) || value;
  };
  const texts = {
    mark: textReader('mark'),
    pointNumber: textReader('pointNumber'),
    description: textReader('description'),
    base: textReader('base'),
    setup: textReader('setup'),
    rover: textReader('rover'),
    crew: textReader('crew'),
    fix: textReader('fix'),
  };
  // The faults of the row that is read at the moment.
  let faults = NO_FAULTS;
  const covariateReader = (role: (typeof COVARIATES)[number]): ((row: number, cells: RowCells) => number) => {
    if (!has(role)) return () => Number.NaN;
    const read = numberReader(role);
    return (row, cells) => {
      const value = read(cells);
      if (value !== null) return value;
      faults = [...faults, { row, column: name(role), cell: textOf(role, cells) }];
      return Number.NaN;
    };
  };
  const [satellites, pdop, ageSeconds, horizontalSigmaM, verticalSigmaM, epochCount] = COVARIATES.map(
    covariateReader,
  ) as [Covariate, Covariate, Covariate, Covariate, Covariate, Covariate];
  const refuse = (row: number, reason: RowReason, role: ColumnRole, detail: string): RowOutcome => ({
    kind: 'set-aside',
    row: { file, row, reason, column: name(role), detail },
  });
  const readCoordinates = coordinateReader(layout, coordinates, at, numberReader, textOf);
  const units = resolvedUnits(layout.units, coordinates.unit);
  const antenna = layout.heightOf === 'antenna' ? metresPer(units.height) : null;
  const rodReader = numberReader('antennaHeight');
  const fixIsGiven = has('fix');
  const extras = extrasReader({
    has,
    textReader,
    numberReader,
    units,
    decimal,
    correctionValues,
    toStudy: fieldBasePlace(options.changes ?? {}),
  });

  return (row, cells) => {
    const when = time.read(cells);
    if (when.kind === 'invalid') return refuse(row, 'unreadable', time.column, when.detail);
    if (when.kind === 'missing') {
      return refuse(
        row,
        'outside-study',
        time.column,
        'the row has neither time nor date; state the date in the constants of the layout or take it fromFileName',
      );
    }
    const measured = readCoordinates(cells);
    if ('detail' in measured) return refuse(row, 'unreadable', measured.role, measured.detail);
    let { latitudeDeg, longitudeDeg, heightM } = measured;
    if (antenna !== null && !Number.isNaN(heightM)) {
      const rod = rodReader(cells);
      if (rod === null || Number.isNaN(rod)) {
        return refuse(
          row,
          'unreadable',
          'antennaHeight',
          `heights are those of the antenna: expected its height above the mark, came ${quoted(textOf('antennaHeight', cells))}`,
        );
      }
      heightM -= rod * antenna;
    }

    const also = extras === null ? null : extras(cells);
    if (also !== null && 'detail' in also) return refuse(row, 'unreadable', also.role, also.detail);
    faults = NO_FAULTS;
    const fixText = texts.fix(cells);
    const fix = fixIsGiven ? fixValues.get(fixText.toLowerCase()) : 'fixed';
    const hasPosition = !Number.isNaN(latitudeDeg);
    const epochs = epochCount(row, cells);
    const position: Position = {
      file,
      row,
      utcMs: when.kind === 'instant' ? when.utcMs : Number.NaN,
      dateOnly: when.kind === 'date' ? when.day : '',
      mark: texts.mark(cells),
      pointNumber: texts.pointNumber(cells),
      description: texts.description(cells),
      base: texts.base(cells),
      setup: texts.setup(cells),
      rover: texts.rover(cells),
      crew: texts.crew(cells),
      fix: fix ?? 'other',
      epochs: epochs >= 1 ? Math.round(epochs) : 1,
      latitudeDeg,
      longitudeDeg,
      heightM,
      satellites: satellites(row, cells),
      pdop: pdop(row, cells),
      ageSeconds: ageSeconds(row, cells),
      horizontalSigmaM: horizontalSigmaM(row, cells),
      verticalSigmaM: verticalSigmaM(row, cells),
      extras: also,
    };
    return {
      kind: 'position',
      position,
      faults,
      unknownFix: fix === undefined && hasPosition ? fixText : null,
    };
  };
}

type Covariate = (row: number, cells: RowCells) => number;
