import type { TimeLayout } from '../time/index.js';
import type { Encoding } from './byteChunks.js';
import type { CoordinateSystem } from './coordinateSystem.js';
import type { Corrections, Fix } from './position.js';
import type { ColumnRole } from './roles.js';

/** Units of lengths in a log. */
export type LogLengthUnit = 'metre' | 'international-foot' | 'us-survey-foot';

/** Units of a log: of plane and geocentric coordinates, of heights and rods, and of angles. */
export interface LogUnits {
  readonly length: LogLengthUnit;
  readonly height: LogLengthUnit;
  readonly angle: 'degrees' | 'dms';
}

/** What layouts of every kind may say: values that stand in no column. */
interface CommonLayout {
  /** Role → value, where the file has no such column or the cell is blank. */
  readonly constants?: Readonly<Partial<Record<ColumnRole, string>>> | undefined;
  /** Regular expression whose named groups are roles; it is matched against the name of the file. */
  readonly fromFileName?: string | undefined;
}

/** Layout of delimited text. Everything has a default. */
export interface DelimitedLayout extends CommonLayout {
  readonly kind: 'delimited';
  /** `comma`, `semicolon`, `tab`, `pipe`, `blanks` (runs of blanks and tabs) or the character itself. */
  readonly delimiter?: string | undefined;
  /** `point`, `comma` or the character itself; default point. */
  readonly decimal?: string | undefined;
  /** Whether the first line names the columns; default true, unless `columns` gives only numbers. */
  readonly header?: boolean | undefined;
  readonly skipLines?: number | undefined;
  readonly comment?: string | undefined;
  /** Default: as the first bytes of the file show. */
  readonly encoding?: Encoding | undefined;
  /** Role → header, or number of the column from 1. */
  readonly columns?: Readonly<Partial<Record<ColumnRole, string | number>>> | undefined;
  readonly units?: LogLengthUnit | { readonly [K in keyof LogUnits]?: LogUnits[K] | undefined } | undefined;
  /** Overrides that of the log entry. */
  readonly coordinates?: CoordinateSystem | undefined;
  /** Whether heights are those of the mark or of the antenna; default mark. */
  readonly heightOf?: 'mark' | 'antenna' | undefined;
  readonly time?: TimeLayout | undefined;
  /** Text of the fix column → its meaning; `fixed` and `float` in any case are understood without it. */
  readonly fixValues?: Readonly<Record<string, Fix>> | undefined;
  /** Text of the corrections column → its meaning; the meanings themselves are understood without it. */
  readonly correctionValues?: Readonly<Record<string, Corrections>> | undefined;
}

/** Layout of NMEA 0183 sentences. */
export interface NmeaLayout extends CommonLayout {
  readonly kind: 'nmea';
}

export type LogLayout = DelimitedLayout | NmeaLayout;

/**
 * Units with every default filled in.
 * @param plane unit of the coordinate system, for lengths of which the layout says nothing
 */
export function resolvedUnits(units: DelimitedLayout['units'], plane: LogLengthUnit = 'metre'): LogUnits {
  if (units === undefined || typeof units === 'string') {
    return { length: units ?? plane, height: units ?? plane, angle: 'degrees' };
  }
  const { length = plane, angle = 'degrees' } = units;
  return { length, height: units.height ?? length, angle };
}

/** The character of a decimal mark. */
export const decimalCharacter = (decimal: string | undefined): string =>
  decimal === undefined || decimal === 'point' ? '.' : decimal === 'comma' ? ',' : decimal;
