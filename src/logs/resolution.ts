import { metresPer } from '../geodesy/index.js';
import type { CoordinateColumns } from './coordinateColumns.js';
import { DecimalCounter, type Resolution } from './decimalCounter.js';
import type { DelimitedHeader } from './header.js';
import { type DelimitedLayout, decimalCharacter, type LogUnits, resolvedUnits } from './layout.js';
import { type Message, message } from './messages.js';
import type { ColumnRole } from './roles.js';
import type { RowCells } from './rowCells.js';

/** In what steps the positions of a log are written, mm on the ground. */
export interface LogResolution {
  readonly horizontalStepMm: number;
  readonly verticalStepMm: number;
}

/** A kind of coordinate column: how it is told of, and how long its unit is on the ground. */
export interface ColumnKind {
  readonly column: string;
  readonly what: string;
  readonly unit: string;
  readonly unitMm: number;
}

/** A degree on the equator of WGS 84 (semi-axis 6378137 m), mm; a degree of latitude has 110.6 km to 111.7 km. */
const DEGREE_MM = (6_378_137_000 * Math.PI) / 180;

export const MINUTES: ColumnKind = {
  column: 'latitude',
  what: 'coordinates',
  unit: 'minute',
  unitMm: DEGREE_MM / 60,
};
export const HEIGHTS: ColumnKind = { column: 'height', what: 'heights', unit: 'metre', unitMm: 1000 };

/** A finer step than this shows nowhere; a coarser one than the second spoils the constant. */
const FINE_MM = 1;
const COARSE_MM = 5;

export const stepMm = ({ decimals }: Resolution, { unitMm }: ColumnKind): number => unitMm / 10 ** decimals;

/** The standard deviation that rounding to a step adds to one axis: step²/12, an even spread over the step. */
export const roundingSigmaMm = (step: number): number => step / Math.sqrt(12);

/** Tells of a column that is rounded to more than a millimetre; null when it is finer. */
export function coarseColumn(file: string, resolution: Resolution | null, kind: ColumnKind): Message | null {
  if (resolution === null) return null;
  const { column, what, unit, unitMm } = kind;
  const { decimals, count, total, firstRow } = resolution;
  const step = stepMm(resolution, kind);
  if (step <= FINE_MM) return null;
  const enough = Math.ceil(Math.log10(unitMm / FINE_MM));
  const shown = step < 1e5 ? `${Number(step.toPrecision(3))} mm` : `${Math.round(step / 1000)} m`;
  const hidden =
    step < 1e5
      ? `; a constant below ${Number(roundingSigmaMm(step).toPrecision(2))} mm an axis cannot show`
      : '';
  const text = `Expected at least ${enough} decimals of a ${unit}, came ${what} that have ${decimals} decimals of a ${unit}: steps of ${shown}, in ${count} of ${total} rows${hidden}. Record more decimals, for rounding is part of every error found here.`;
  return message(step > COARSE_MM ? 'warning' : 'info', 'resolution', text, { file, row: firstRow, column });
}

/** So many rows of a file are looked at: decimals do not change within an export. */
const ROWS_LOOKED_AT = 5000;
/** A few round numbers say nothing of the rest. */
const FEWEST_ROWS = 20;

/** Finds in what steps the coordinates of a delimited log are written, from the texts of its first rows. */
export class ResolutionMeter {
  readonly #columns: readonly { index: number; kind: ColumnKind; dms: boolean; counter: DecimalCounter }[];
  readonly #decimal: string;
  #rows = 0;

  constructor(
    header: DelimitedHeader,
    { roles, unit }: Pick<CoordinateColumns, 'roles' | 'unit'>,
    layout: DelimitedLayout,
  ) {
    const units = resolvedUnits(layout.units, unit);
    this.#decimal = decimalCharacter(layout.decimal);
    this.#columns = roles.flatMap((role) => {
      const index = header.positions.get(role);
      if (index === undefined) return [];
      const kind = columnKind(role, header.headers.get(role) ?? role, units);
      return [{ index, kind, dms: kind.unit === 'second', counter: new DecimalCounter() }];
    });
  }

  add(row: number, cells: RowCells): void {
    if (this.#rows >= ROWS_LOOKED_AT) return;
    this.#rows += 1;
    for (const { index, dms, counter } of this.#columns) {
      // Letters and signs behind the seconds of an angle are no decimals.
      const text = dms ? cells.text(index).replace(/[^\d.,]+$/, '') : cells.text(index);
      if (text === '' || /e/i.test(text)) continue;
      const at = text.indexOf(this.#decimal);
      counter.add(at < 0 ? 0 : text.length - at - 1, row);
    }
  }

  messages(file: string): Message[] {
    if (this.#rows < FEWEST_ROWS) return [];
    const told = this.#columns.flatMap(
      ({ kind, counter }) => coarseColumn(file, counter.resolution(), kind) ?? [],
    );
    // Two columns of a plan position are written alike: one of them is told of.
    return told.filter(
      (m, k) => k === 0 || m.column === this.#columns.at(-1)!.kind.column || told[k - 1]!.text !== m.text,
    );
  }

  resolution(): LogResolution | null {
    const steps = this.#columns.flatMap(({ kind, counter }) => {
      const found = counter.resolution();
      return found === null ? [] : [stepMm(found, kind)];
    });
    if (steps.length === 0) return null;
    return { horizontalStepMm: Math.max(...steps.slice(0, 2)), verticalStepMm: steps.at(-1)! };
  }
}

function columnKind(role: ColumnRole, column: string, units: LogUnits): ColumnKind {
  const isAngle = role === 'latitude' || role === 'longitude';
  if (isAngle && units.angle === 'dms')
    return { column, what: 'coordinates', unit: 'second', unitMm: DEGREE_MM / 3600 };
  if (isAngle) return { column, what: 'coordinates', unit: 'degree', unitMm: DEGREE_MM };
  const length = role === 'height' ? units.height : units.length;
  const unit = length === 'metre' ? 'metre' : 'foot';
  return {
    column,
    what: role === 'height' ? 'heights' : 'coordinates',
    unit,
    unitMm: metresPer(length) * 1000,
  };
}
