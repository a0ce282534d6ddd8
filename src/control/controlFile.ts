import type { ColumnRole, CoordinateChanges, CoordinateSystem, LogUnits } from '../logs/index.js';

/** Where a table of points with known coordinates stands and how it is written. */
export interface ControlFile {
  readonly path: string;
  /** Name in messages. */
  readonly file: string;
  readonly coordinates: CoordinateSystem;
  readonly columns?: Readonly<Partial<Record<ColumnRole, string>>> | undefined;
  /** Default metres and degrees. */
  readonly units?: { readonly [K in keyof LogUnits]?: LogUnits[K] | undefined } | undefined;
  /** What the heights are those of; default mark. With `antenna` the column antennaHeight is subtracted. */
  readonly heightOf?: 'mark' | 'antenna' | undefined;
  /** What must be done to the coordinates before they can be compared with those of logs. */
  readonly changes?: CoordinateChanges | undefined;
  /** Frame and epoch (decimal year) of rows that state none. */
  readonly frame?: string | undefined;
  readonly epoch?: number | undefined;
}
