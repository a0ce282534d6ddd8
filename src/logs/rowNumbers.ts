import { metresPer } from '../geodesy/index.js';
import type { CoordinateColumns } from './coordinateColumns.js';
import { CoordinateFault } from './coordinateFault.js';
import { parseDms } from './dms.js';
import { type DelimitedLayout, decimalCharacter, resolvedUnits } from './layout.js';
import { quoted } from './messages.js';
import { parseNumber } from './numbers.js';
import type { ColumnRole } from './roles.js';
import type { RowCells, TextOf } from './rowCells.js';
import { DECIMAL_COMMA } from './unreadableRemedy.js';

/** For a role a function that reads its number in a row: its cell, or the constant where the cell is blank. */
export type NumberReaders = (role: ColumnRole) => (cells: RowCells) => number | null;

export function numberReaders(
  at: (role: ColumnRole) => number,
  values: Readonly<Partial<Record<ColumnRole, string>>>,
  decimal: string,
): NumberReaders {
  return (role) => {
    const index = at(role);
    const constant =
      values[role] === undefined ? Number.NaN : parseNumber(values[role].replace(decimal, '.'));
    return (cells) => {
      const value = cells.number(index);
      return value !== null && Number.isNaN(value) ? constant : value;
    };
  };
}

export interface MeasuredPosition {
  readonly latitudeDeg: number;
  readonly longitudeDeg: number;
  readonly heightM: number;
}

export interface CoordinateRefusal {
  readonly role: ColumnRole;
  readonly detail: string;
}

const NO_POSITION: MeasuredPosition = {
  latitudeDeg: Number.NaN,
  longitudeDeg: Number.NaN,
  heightM: Number.NaN,
};

export function coordinateReader(
  layout: DelimitedLayout,
  coordinates: CoordinateColumns,
  at: (role: ColumnRole) => number,
  numberReader: NumberReaders,
  textOf: TextOf,
): (cells: RowCells) => MeasuredPosition | CoordinateRefusal {
  const units = resolvedUnits(layout.units, coordinates.unit);
  const decimal = decimalCharacter(layout.decimal);
  const isAngle = (role: ColumnRole): boolean => role === 'latitude' || role === 'longitude';
  const readers = coordinates.roles.map((role): ((cells: RowCells) => number | null) => {
    const index = at(role);
    if (isAngle(role) && units.angle === 'dms') {
      return (cells) =>
        parseDms(decimal === '.' ? cells.text(index) : cells.text(index).replace(decimal, '.'));
    }
    const read = numberReader(role);
    if (isAngle(role)) return read;
    const factor = metresPer(role === 'height' ? units.height : units.length);
    return (cells) => {
      const value = read(cells);
      return value === null ? null : value * factor;
    };
  });
  const separation = coordinates.rowSeparations ? numberReader('geoidSeparation') : null;
  const heightFactor = metresPer(units.height);
  const [first, second, third] = readers as [(typeof readers)[0], (typeof readers)[0], (typeof readers)[0]];
  return (cells) => {
    const [a, b, c] = [first(cells), second(cells), third(cells)];
    if (a === null || b === null || c === null) {
      const role = coordinates.roles[a === null ? 0 : b === null ? 1 : 2];
      const cell = textOf(role, cells);
      const dms = isAngle(role) && units.angle === 'dms';
      return { role, detail: dms ? notAnAngle(cell) : notANumber(cell) };
    }
    if (Number.isNaN(a + b + c)) return NO_POSITION;
    try {
      if (separation === null) return coordinates.toGeodetic(a, b, c);
      const given = separation(cells);
      if (given === null) {
        return { role: 'geoidSeparation', detail: notANumber(textOf('geoidSeparation', cells)) };
      }
      return coordinates.toGeodetic(a, b, c, given * heightFactor);
    } catch (error) {
      if (!(error instanceof CoordinateFault)) throw error;
      return { role: coordinates.roles[error.index], detail: error.message };
    }
  };
}

function notANumber(cell: string): string {
  const comma = /^[-+]?\d+,\d+$/.test(cell) ? ` ${DECIMAL_COMMA}; state decimal: comma in the layout` : '';
  const angle =
    /\d\D+\d+\D+\d/.test(cell) && comma === ''
      ? '; are these degrees, minutes and seconds (units: {angle: dms})?'
      : '';
  return `expected a number, came ${quoted(cell)}${comma}${angle}`;
}

const notAnAngle = (cell: string): string =>
  `expected degrees, minutes and seconds like 53 48 33.82 N, came ${quoted(cell)}`;
