import { type Geodetic, metresPer } from '../geodesy/index.js';
import {
  type ColumnRole,
  CoordinateFault,
  coordinateColumns,
  type DelimitedHeader,
  type Message,
  message,
  parseDms,
  parseNumber,
  quoted,
  readDelimitedTable,
  type TableRow,
} from '../logs/index.js';
import { parseIsoTime } from '../time/index.js';
import type { ControlFile } from './controlFile.js';

/** Cells of one row by role, with what is wrong with them reported under its number. */
export interface ControlCellsRow {
  readonly row: number;
  readonly text: (role: ColumnRole) => string;
  /** NaN when blank, and when it is no number, which is reported. */
  readonly number: (role: ColumnRole) => number;
  /** The coordinates as the study compares them; null when they cannot be, which is reported. */
  readonly place: () => { readonly place: Geodetic; readonly half: boolean } | null;
  readonly report: (code: string, text: string, role: ColumnRole) => void;
  /** Something of this row was reported. */
  readonly faulty: () => boolean;
  readonly isDay: (text: string) => boolean;
}

const DECIMAL_COMMA = /^[-+]?\d*,\d+$/;

const NO_ROD =
  'Heights are those of the antenna: expected its height above the mark, came a blank cell. Fill it in.';

const isDay = (text: string): boolean =>
  /^\d{4}-\d{2}-\d{2}$/.test(text) && parseIsoTime(text).kind === 'date';

/** The cells of a marks or bases file, and everything that is wrong with them. */
export class ControlCells {
  readonly errors: Message[] = [];
  /** Cells whose numbers have a decimal comma. */
  #commas = 0;

  private constructor(
    readonly control: ControlFile,
    readonly header: DelimitedHeader,
    readonly rows: readonly TableRow[],
    readonly messages: readonly Message[],
  ) {}

  /** @throws InputError when the header is not understood */
  static async read(control: ControlFile, nameRole: 'mark' | 'base' | 'pointNumber'): Promise<ControlCells> {
    const { path, file, columns, coordinates, heightOf, changes } = control;
    const { roles, together } = coordinateColumns(coordinates, changes);
    if (nameRole === 'pointNumber') {
      // Points of a job are needed in plan alone.
      const { header, rows, messages } = await readDelimitedTable(path, file, {
        columns,
        required: roles.slice(0, together),
        requiredOneOf: [{ what: 'the name of the point', roles: ['pointNumber', 'mark'] }],
      });
      return new ControlCells(control, header, rows, messages);
    }
    const required: ColumnRole[] = [nameRole, ...roles];
    if (heightOf === 'antenna') required.push('antennaHeight');
    if (changes?.rowSeparations === true) required.push('geoidSeparation');
    const { header, rows, messages } = await readDelimitedTable(path, file, { columns, required });
    return new ControlCells(control, header, rows, messages);
  }

  /** The rows whose lines could be cut into cells, one after the other. */
  *readableRows(): Generator<ControlCellsRow> {
    for (const { row, cells, fault } of this.rows) {
      if (cells !== null) yield this.#row(row, cells);
      else this.#report('unreadable', `The row cannot be read: ${fault}. Correct it.`, row, null);
    }
  }

  #row(row: number, cells: readonly string[]): ControlCellsRow {
    const { positions } = this.header;
    const before = this.errors.length;
    const text = (role: ColumnRole): string => cells[positions.get(role) ?? -1] ?? '';
    const report = (code: string, told: string, role: ColumnRole): void =>
      this.#report(code, told, row, role);
    const number = (role: ColumnRole): number => {
      const angle = this.control.units?.angle === 'dms' && (role === 'latitude' || role === 'longitude');
      const value = angle ? parseDms(text(role)) : parseNumber(text(role));
      if (value !== null) return value;
      if (!angle && DECIMAL_COMMA.test(text(role))) {
        this.#decimalComma(text(role), row, role);
        return Number.NaN;
      }
      const expected = angle ? 'degrees, minutes and seconds like 53 48 33.82 N' : 'a number';
      const came = quoted(text(role));
      report('not-a-number', `Expected ${expected}, came ${came}. Correct the cell or leave it blank.`, role);
      return Number.NaN;
    };
    const commasBefore = this.#commas;
    const faulty = (): boolean => this.errors.length > before || this.#commas > commasBefore;
    return { row, text, number, report, faulty, isDay, place: () => this.#place(number, report, faulty) };
  }

  #place(
    number: ControlCellsRow['number'],
    report: ControlCellsRow['report'],
    faulty: () => boolean,
  ): { place: Geodetic; half: boolean } | null {
    const { coordinates, changes, units, heightOf } = this.control;
    const { roles, together, toGeodetic, rowSeparations, unit } = coordinateColumns(coordinates, changes);
    const plan = metresPer(units?.length ?? unit);
    const vertical = metresPer(units?.height ?? units?.length ?? unit);
    const metres = (role: ColumnRole): number => {
      const value = number(role);
      if (role === 'latitude' || role === 'longitude') return value;
      return value * (role === 'height' || role === 'antennaHeight' ? vertical : plan);
    };
    let [first, second, third] = roles.map(metres) as [number, number, number];
    if (heightOf === 'antenna' && !Number.isNaN(third)) {
      const rodM = metres('antennaHeight');
      if (Number.isNaN(rodM)) report('no-antenna-height', NO_ROD, 'antennaHeight');
      third -= rodM;
    }
    const separationM = rowSeparations ? number('geoidSeparation') * vertical : Number.NaN;
    if (faulty()) return null;
    const blank = [first, second, third].slice(0, together).filter(Number.isNaN).length;
    const half = blank > 0 && blank < together;
    try {
      if (blank === 0) return { place: toGeodetic(first, second, third, separationM), half };
      return { place: this.#heightAlone(together === 2 ? third : Number.NaN, separationM), half };
    } catch (error) {
      if (!(error instanceof CoordinateFault)) throw error;
      report(
        'out-of-range',
        `The coordinates cannot be used: ${error.message}. Correct them.`,
        roles[error.index],
      );
      return null;
    }
  }

  /** A mark known in height only: what needs its place cannot be done to it. */
  #heightAlone(heightM: number, separationM: number): Geodetic {
    const { height, frame } = this.control.changes ?? {};
    const place = { latitudeDeg: Number.NaN, longitudeDeg: Number.NaN, heightM };
    if (Number.isNaN(heightM)) return place;
    if (frame !== undefined) {
      throw new CoordinateFault('a height without a place cannot be taken to another frame', 2);
    }
    return height === undefined ? place : { ...place, heightM: height(place, separationM) };
  }

  /** Told once: where one number has a comma, mostly all have. */
  #decimalComma(came: string, row: number, role: ColumnRole): void {
    this.#commas += 1;
    if (this.#commas > 1) return;
    const text = `Expected numbers with a decimal point, came ${quoted(came)}: numbers are written with a comma. Write all numbers of this file with a point, here ${came.replace(',', '.')}.`;
    this.#report('decimal-comma', text, row, role);
  }

  #report(code: string, text: string, row: number, role: ColumnRole | null): void {
    const column = role === null ? {} : { column: this.header.headers.get(role) ?? role };
    this.errors.push(message('error', code, text, { file: this.control.file, row, ...column }));
  }
}
