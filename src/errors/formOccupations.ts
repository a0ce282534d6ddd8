import type { Control } from '../control/index.js';
import type { FileAccount, LogBatch, LogResolution, Message, SetAsideRow } from '../logs/index.js';
import { EpochSorter } from './epochSorter.js';
import type { FarOffPlace } from './farOffPlaces.js';
import type { Occupation, Visit } from './occupation.js';

export interface FormOccupationsOptions {
  /** IANA name or offset such as `+02:00`; null takes the local mean solar day at the base. */
  readonly timeZone?: string | null | undefined;
  /** First and last day of the study, `YYYY-MM-DD`, both included. */
  readonly period?: { readonly from: string; readonly to: string } | null | undefined;
  /** A longer gap begins a new visit; default 60. */
  readonly gapSeconds?: number | undefined;
  /** Cuts long occupations into shots of this length; default none. */
  readonly windowSeconds?: number | null | undefined;
  /** Is given every set-aside row as soon as it is known, so that long lists need not stay in memory. */
  readonly onSetAside?: ((row: SetAsideRow) => void) | undefined;
  /** Epochs that wait in memory before they go to a temporary file; default 300 000. */
  readonly epochsInMemory?: number | undefined;
  /** Is told of rows read, now and then. */
  readonly onProgress?: ((rowsRead: number) => void) | undefined;
}

export interface FormedOccupations {
  /** In the order of start time, rover and mark. */
  readonly occupations: readonly Occupation[];
  readonly visits: readonly Visit[];
  /** The account of each file: `read = used + Σ setAside`. */
  readonly files: readonly FileAccount[];
  /** File → the steps in which its positions are written. */
  readonly resolutions: ReadonlyMap<string, LogResolution>;
  /** Some positions more than 1000 km from their marks: no means are formed of them, but they may tell their cause. */
  readonly farOff: readonly FarOffPlace[];
  readonly messages: readonly Message[];
}

/**
 * Reduces a stream of positions to visits and occupations. Memory holds these and a fixed budget of epochs, whatever the
 * length of the logs.
 *
 * Visits and occupations do not depend on the order of rows or files, nor on how a log is cut into files; only `file`
 * and `row` of an occupation, and which of several equal rows counts as the duplicate, follow the names of the files and
 * the rows in them. Accounts and messages of files come in the order of reading.
 * @throws RangeError when `gapSeconds` is not above 0
 */
export async function formOccupations(
  batches: AsyncIterable<LogBatch>,
  control: Control,
  options: FormOccupationsOptions = {},
): Promise<FormedOccupations> {
  const { gapSeconds = 60, windowSeconds = null } = options;
  for (const [name, seconds] of Object.entries({ gapSeconds, windowSeconds: windowSeconds ?? 1 })) {
    if (!(seconds > 0)) throw new RangeError(`${name}: expected a number above 0, received ${seconds}`);
  }
  const sorter = new EpochSorter(control, options, gapSeconds * 1000);
  try {
    let rowsRead = 0;
    for await (const batch of batches) {
      sorter.take(batch);
      rowsRead += batch.rowsRead;
      options.onProgress?.(rowsRead);
    }
    return sorter.reduce();
  } finally {
    sorter.close();
  }
}
