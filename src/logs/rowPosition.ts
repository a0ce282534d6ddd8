import { metresPer } from '../geodesy/index.js';
import { type CoordinateColumns, CoordinateFault } from './coordinateColumns.js';
import { parseDms } from './dms.js';
import type { DelimitedHeader } from './header.js';
import { type DelimitedLayout, decimalCharacter, resolvedUnits } from './layout.js';
import { quoted } from './messages.js';
import { parseNumber } from './numbers.js';
import type { Fix, Position } from './position.js';
import type { RowReason, SetAsideRow } from './reasons.js';
import type { ColumnRole } from './roles.js';
import type { RowCells } from './rowCells.js';
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
const TEXTS = ['mark', 'base', 'setup', 'rover', 'crew', 'pointNumber', 'description'] as const;

/**
 * A function that turns data rows of one file into positions.
 * @throws Error for a time format or zone that is not understood
 */
export function rowPosition(options: RowPositionOptions): (row: number, cells: RowCells) => RowOutcome {
  const { file, header, layout, coordinates, fixValues, values } = options;
  const at = (role: ColumnRole): number => header.positions.get(role) ?? -1;
  const name = (role: ColumnRole): string => header.headers.get(role) ?? role;
  const has = (role: ColumnRole): boolean => header.positions.has(role) || values[role] !== undefined;
  const textOf = (role: ColumnRole, cells: RowCells): string => cells.text(at(role)) || (values[role] ?? '');
  const numberOf = numberReader(at, values, decimalCharacter(layout.decimal));
  const time = timePlan(has, textOf, layout.time ?? {}, options.timeZone);
  const textPlans = TEXTS.map((role) => ({ index: at(role), value: values[role] ?? '' }));
  const covariates = COVARIATES.filter(has);
  const readCoordinates = coordinateReader(layout, coordinates, at, numberOf);
  const antenna = layout.heightOf === 'antenna' ? metresPer(resolvedUnits(layout.units).height) : null;
  const fixAt = at('fix');
  const fixValue = values.fix ?? '';

  return (row, cells) => {
    const refuse = (reason: RowReason, role: ColumnRole | null, detail: string): RowOutcome => ({
      kind: 'set-aside',
      row: { file, row, reason, column: role === null ? null : name(role), detail },
    });
    const when = time.read(cells);
    if (when.kind === 'invalid') return refuse('unreadable', time.column, when.detail);
    if (when.kind === 'missing') {
      return refuse(
        'outside-study',
        time.column,
        'the row has neither time nor date; state the date in the constants of the layout or take it fromFileName',
      );
    }
    const measured = readCoordinates(cells);
    if ('detail' in measured) return refuse('unreadable', measured.role, measured.detail);
    let { latitudeDeg, longitudeDeg, heightM } = measured;
    if (antenna !== null && !Number.isNaN(heightM)) {
      const rod = numberOf('antennaHeight', cells);
      if (rod === null || Number.isNaN(rod)) {
        return refuse(
          'unreadable',
          'antennaHeight',
          `heights are those of the antenna: expected its height above the mark, came ${quoted(textOf('antennaHeight', cells))}`,
        );
      }
      heightM -= rod * antenna;
    }

    let faults = NO_FAULTS;
    const covariate = (role: (typeof COVARIATES)[number]): number => {
      if (!covariates.includes(role)) return Number.NaN;
      const value = numberOf(role, cells);
      if (value !== null) return value;
      faults = [...faults, { row, column: name(role), cell: textOf(role, cells) }];
      return Number.NaN;
    };
    const [mark, base, setup, rover, crew, pointNumber, description] = textPlans.map(
      ({ index, value }) => cells.text(index) || value,
    ) as [string, string, string, string, string, string, string];
    const fixText = cells.text(fixAt) || fixValue;
    const fix = fixAt < 0 && fixValue === '' ? 'fixed' : fixValues.get(fixText.toLowerCase());
    const hasPosition = !Number.isNaN(latitudeDeg);
    const epochs = covariate('epochs');
    const position: Position = {
      file,
      row,
      utcMs: when.kind === 'instant' ? when.utcMs : Number.NaN,
      dateOnly: when.kind === 'date' ? when.day : '',
      mark,
      pointNumber,
      description,
      base,
      setup,
      rover,
      crew,
      fix: fix ?? 'other',
      epochs: epochs >= 1 ? Math.round(epochs) : 1,
      latitudeDeg,
      longitudeDeg,
      heightM,
      satellites: covariate('satellites'),
      pdop: covariate('pdop'),
      ageSeconds: covariate('ageSeconds'),
      horizontalSigmaM: covariate('horizontalSigma'),
      verticalSigmaM: covariate('verticalSigma'),
    };
    return {
      kind: 'position',
      position,
      faults,
      unknownFix: fix === undefined && hasPosition ? fixText : null,
    };
  };
}

/** Number of a role in a row: its cell, or the constant where the cell is blank. */
type NumberOf = (role: ColumnRole, cells: RowCells) => number | null;

function numberReader(
  at: (role: ColumnRole) => number,
  values: RowPositionOptions['values'],
  decimal: string,
): NumberOf {
  const constants = new Map(
    Object.entries(values).map(([role, text]) => [role, parseNumber(text.replace(decimal, '.'))]),
  );
  return (role, cells) => {
    const value = cells.number(at(role));
    return value !== null && Number.isNaN(value) ? (constants.get(role) ?? value) : value;
  };
}

interface MeasuredPosition {
  readonly latitudeDeg: number;
  readonly longitudeDeg: number;
  readonly heightM: number;
}

interface CoordinateRefusal {
  readonly role: ColumnRole;
  readonly detail: string;
}

const NO_POSITION: MeasuredPosition = {
  latitudeDeg: Number.NaN,
  longitudeDeg: Number.NaN,
  heightM: Number.NaN,
};

function coordinateReader(
  layout: DelimitedLayout,
  coordinates: CoordinateColumns,
  at: (role: ColumnRole) => number,
  numberOf: NumberOf,
): (cells: RowCells) => MeasuredPosition | CoordinateRefusal {
  const units = resolvedUnits(layout.units);
  const decimal = decimalCharacter(layout.decimal);
  const isAngle = (role: ColumnRole): boolean => role === 'latitude' || role === 'longitude';
  const plans = coordinates.roles.map((role) => ({
    role,
    dms: isAngle(role) && units.angle === 'dms',
    factor: isAngle(role) ? 1 : metresPer(role === 'height' ? units.height : units.length),
  }));
  const [first, second, third] = plans as [Plan, Plan, Plan];
  const read = ({ role, dms, factor }: Plan, cells: RowCells): number | null => {
    if (dms)
      return parseDms(decimal === '.' ? cells.text(at(role)) : cells.text(at(role)).replace(decimal, '.'));
    const value = numberOf(role, cells);
    return value === null ? null : value * factor;
  };
  return (cells) => {
    const [a, b, c] = [read(first, cells), read(second, cells), read(third, cells)];
    if (a === null || b === null || c === null) {
      const { role, dms } = a === null ? first : b === null ? second : third;
      return { role, detail: dms ? notAnAngle(cells.text(at(role))) : notANumber(cells.text(at(role))) };
    }
    if (Number.isNaN(a + b + c)) return NO_POSITION;
    try {
      return coordinates.toGeodetic(a, b, c);
    } catch (error) {
      if (!(error instanceof CoordinateFault)) throw error;
      return { role: coordinates.roles[error.index], detail: error.message };
    }
  };
}

interface Plan {
  readonly role: ColumnRole;
  readonly dms: boolean;
  readonly factor: number;
}

function notANumber(cell: string): string {
  const comma = /^[-+]?\d+,\d+$/.test(cell)
    ? ' with a decimal comma; state decimal: comma in the layout'
    : '';
  const angle =
    /\d\D+\d+\D+\d/.test(cell) && comma === ''
      ? '; are these degrees, minutes and seconds (units: {angle: dms})?'
      : '';
  return `expected a number, came ${quoted(cell)}${comma}${angle}`;
}

const notAnAngle = (cell: string): string =>
  `expected degrees, minutes and seconds like 53 48 33.82 N, came ${quoted(cell)}`;
