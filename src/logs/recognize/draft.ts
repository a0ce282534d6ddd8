import type { CoordinateSystem } from '../coordinateSystem.js';
import type { DelimitedLayout } from '../layout.js';
import type { ColumnRole } from '../roles.js';
import type { Column } from './columns.js';
import type { Doubt } from './recognition.js';
import type { Sheet } from './sheet.js';

/** Parts of a layout that steps of the recognition decide, beside the columns. */
export type DecidedParts = Pick<DelimitedLayout, 'units' | 'time' | 'fromFileName'>;

/** A layout while it is being recognised: which column has which role, and what is not sure. */
export class Draft {
  readonly roles = new Map<ColumnRole, Column>();
  readonly doubts: Doubt[] = [];
  /** Columns that a doubt names already, so that they are not listed as unused. */
  readonly asked = new Set<Column>();
  coordinates: CoordinateSystem | null = null;
  parts: DecidedParts = {};

  constructor(
    readonly sheet: Sheet,
    readonly columns: readonly Column[],
    readonly decimal: '.' | ',',
  ) {}

  assign(role: ColumnRole, column: Column): void {
    this.roles.set(role, column);
  }

  /** A doubt that concerns columns, if any. */
  doubt(doubt: Doubt, columns: readonly Column[] = []): void {
    this.doubts.push(doubt);
    for (const column of columns) this.asked.add(column);
  }

  has(...roles: readonly ColumnRole[]): boolean {
    return roles.every((role) => this.roles.has(role));
  }

  /** Columns with cells that have no role and are in no question yet. */
  free(): Column[] {
    const taken = new Set(this.roles.values());
    return this.columns.filter(
      (column) => column.texts.length > 0 && !taken.has(column) && !this.asked.has(column),
    );
  }

  /** Whether the header names columns in words that mean nothing here: then cells must tell. */
  get isNameless(): boolean {
    return this.sheet.header === null && this.sheet.looseNames === null;
  }
}
