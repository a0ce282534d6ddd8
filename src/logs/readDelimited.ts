import { detectEncoding, type Encoding, readHead, readLineChunks } from './byteChunks.js';
import type { DelimitedHeader, DelimitedOptions } from './header.js';
import { InputError, inputError, type Message, message } from './messages.js';
import { RowReader, type RowSink } from './rowReader.js';

/**
 * Reads a delimited file from its first to its last line and hands everything to a sink. Between chunks of lines it
 * yields, so that the caller can pass on what came.
 * @param file name of the file in messages
 */
export async function* readDelimited(
  path: string,
  file: string,
  options: DelimitedOptions & { readonly encoding?: Encoding | undefined },
  sink: RowSink,
): AsyncGenerator<void> {
  const detected = detectEncoding(await readHead(path));
  const encoding = options.encoding ?? detected.encoding;
  let tell = options.encoding === undefined && detected.guessed;
  const reader = new RowReader(file, options, sink);
  for await (const chunk of readLineChunks(path, encoding)) {
    reader.take(chunk);
    if (tell && reader.understood) {
      sink.message(guessedEncoding(encoding, file));
      tell = false;
    }
    yield;
  }
}

function guessedEncoding(encoding: Encoding, file: string): Message {
  return message(
    'warning',
    'guessed-encoding',
    `Expected text in UTF-8, came bytes that are not: they are read as ${encoding}. Look at names with accents, and state the encoding in the layout.`,
    { file },
  );
}

/** A data line of a small table and its cells as texts; null when it cannot be cut into the columns of the header. */
export interface TableRow {
  readonly row: number;
  readonly cells: readonly string[] | null;
  /** Why there are no cells. */
  readonly fault: string;
}

/** A whole delimited file in memory, for marks and bases; throws InputError when its header is not understood. */
export async function readDelimitedTable(
  path: string,
  file: string,
  options: DelimitedOptions,
): Promise<{ header: DelimitedHeader; rows: TableRow[]; messages: Message[] }> {
  let header: DelimitedHeader | null = null;
  const rows: TableRow[] = [];
  const messages: Message[] = [];
  const sink: RowSink = {
    header(next) {
      if (header?.readable) {
        const { row } = messages.find(({ code }) => code === 'changed-header')!;
        throw inputError(
          'changed-header',
          'Expected one header, came a second one with other columns. Give the rows below it a file of their own.',
          { file, row: row! },
        );
      }
      header ??= next;
    },
    row(row, cells) {
      rows.push({ row, cells: Array.from({ length: header!.width }, (_, k) => cells.text(k)), fault: '' });
    },
    fault(row, fault) {
      rows.push({ row, cells: null, fault });
    },
    message(told) {
      messages.push(told);
    },
  };
  for await (const _ of readDelimited(path, file, options, sink));
  // Assigned in a callback, which the compiler does not follow.
  const found = header as DelimitedHeader | null;
  if (found === null) {
    throw inputError(
      'empty-file',
      'Expected a header and at least one row, came an empty file. Fill it in.',
      {
        file,
      },
    );
  }
  if (!found.readable) throw new InputError(found.messages.filter(({ severity }) => severity === 'error'));
  return { header: found, rows, messages };
}
