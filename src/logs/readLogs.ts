import { type CoordinateSystem, coordinateColumns } from './coordinateColumns.js';
import { readDelimited } from './delimited.js';
import { FileNotes } from './fileNotes.js';
import type { DelimitedHeader } from './header.js';
import type { Message } from './messages.js';
import type { Fix, Position } from './position.js';
import { positionReader } from './readPosition.js';
import type { SetAsideRow } from './reasons.js';
import type { ColumnRole } from './roles.js';

/** How the logs of one group are written. Everything has a default. */
export interface LogLayout {
  readonly kind: 'delimited';
  readonly delimiter?: string | undefined;
  readonly comment?: string | undefined;
  readonly columns?: Readonly<Partial<Record<ColumnRole, string>>> | undefined;
  /** Text of the fix column → its meaning; `fixed` and `float` in any case are understood without it. */
  readonly fixValues?: Readonly<Record<string, Fix>> | undefined;
}

export interface LogFile {
  readonly path: string;
  /** Name in messages and accounts, relative to the study file. */
  readonly file: string;
  readonly layout: LogLayout;
  readonly coordinates: CoordinateSystem;
}

/** A stretch of one log. `rowsRead = positions + setAside`. */
export interface LogBatch {
  readonly file: string;
  readonly rowsRead: number;
  readonly positions: readonly Position[];
  readonly setAside: readonly SetAsideRow[];
  /** Messages about the file as a whole, each sent once. */
  readonly messages: readonly Message[];
}

export interface ReadLogsOptions {
  /** Zone of times that are written without one; null refuses them. */
  readonly timeZone: string | null;
}

/**
 * Positions of the logs, as a stream in the order of files and rows. A file is opened when its turn comes, and
 * memory does not depend on the length of a log.
 */
export async function* readLogs(
  files: readonly LogFile[],
  options: ReadLogsOptions,
): AsyncGenerator<LogBatch> {
  for (const file of files) yield* readLog(file, options);
}

async function* readLog(log: LogFile, options: ReadLogsOptions): AsyncGenerator<LogBatch> {
  const { file, path, layout } = log;
  const coordinates = coordinateColumns(log.coordinates);
  const fixValues = new Map<string, Fix>([
    ['fixed', 'fixed'],
    ['float', 'float'],
    ...Object.entries(layout.fixValues ?? {}).map(([text, fix]): [string, Fix] => [
      text.trim().toLowerCase(),
      fix,
    ]),
  ]);
  const notes = new FileNotes(file);
  const required: ColumnRole[] = ['time', 'mark', ...coordinates.roles];
  let header: DelimitedHeader | null = null;
  let read: ReturnType<typeof positionReader> | null = null;
  for await (const batch of readDelimited(path, file, { ...layout, required })) {
    if (read === null || batch.header !== header) {
      header = batch.header;
      read = positionReader({ file, header, coordinates, timeZone: options.timeZone, fixValues });
      notes.see(header);
    }
    const positions: Position[] = [];
    const setAside: SetAsideRow[] = [];
    for (const row of batch.rows) {
      const outcome = read(row);
      if (outcome.kind === 'set-aside') setAside.push(outcome.row);
      else {
        positions.push(outcome.position);
        notes.add(outcome);
      }
    }
    notes.rows += batch.rows.length;
    yield { file, rowsRead: batch.rows.length, positions, setAside, messages: batch.messages };
  }
  yield { file, rowsRead: 0, positions: [], setAside: [], messages: notes.messages() };
}
