import { type CoordinateSystem, coordinateColumns } from './coordinateColumns.js';
import { readDelimited } from './delimited.js';
import { type Message, message } from './messages.js';
import type { Fix, Position } from './position.js';
import { type CellFault, positionReader } from './readPosition.js';
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
    ...Object.entries(layout.fixValues ?? {}).map(([text, fix]): [string, Fix] => [text.toLowerCase(), fix]),
  ]);
  const notes = new FileNotes(file);
  let read: ReturnType<typeof positionReader> | null = null;
  const required: ColumnRole[] = ['time', 'mark', ...coordinates.roles];
  for await (const batch of readDelimited(path, file, { ...layout, required })) {
    const messages: Message[] = [];
    if (read === null) {
      const { header } = batch;
      read = positionReader({ file, header, coordinates, timeZone: options.timeZone, fixValues });
      messages.push(...header.messages);
      if (header.readable && !header.positions.has('fix')) messages.push(notes.noFixColumn());
    }
    const positions: Position[] = [];
    const setAside: SetAsideRow[] = [];
    for (const row of batch.rows) {
      const outcome = read(row);
      if (outcome.kind === 'set-aside') setAside.push(outcome.row);
      else {
        positions.push(outcome.position);
        if (outcome.faults.length > 0) notes.add(outcome.faults);
      }
    }
    yield { file, rowsRead: batch.rows.length, positions, setAside, messages };
  }
  const messages = read === null ? [notes.empty()] : notes.messages();
  yield { file, rowsRead: 0, positions: [], setAside: [], messages };
}

/** What is told of a file once, however many rows it concerns. */
class FileNotes {
  readonly #faults = new Map<string, { first: CellFault; count: number }>();

  constructor(readonly file: string) {}

  add(faults: readonly CellFault[]): void {
    for (const fault of faults) {
      const entry = this.#faults.get(fault.column);
      if (entry === undefined) this.#faults.set(fault.column, { first: fault, count: 1 });
      else entry.count += 1;
    }
  }

  noFixColumn(): Message {
    return message(
      'info',
      'no-fix-column',
      'The log has no column "fix": every row counts as fixed. Export the state of the fix where the controller can.',
      { file: this.file },
    );
  }

  empty(): Message {
    return message(
      'warning',
      'empty-log',
      'Expected a header and positions, came an empty file. Export it again.',
      {
        file: this.file,
      },
    );
  }

  messages(): Message[] {
    return [...this.#faults].map(([column, { first, count }]) =>
      message(
        'warning',
        'unread-value',
        `Expected a number, came ${JSON.stringify(first.cell)}: ${count === 1 ? 'the row is' : `${count} rows are`} used without this value. Leave the cell blank where nothing is known.`,
        { file: this.file, row: first.row, column },
      ),
    );
  }
}
