import { createReadStream } from 'node:fs';

/** A run of consecutive lines of a text file. */
export interface LineBatch {
  /** Line number of `lines[0]`, from 1. */
  readonly firstLine: number;
  readonly lines: readonly string[];
}

/** A longer line is no line of a position log: it is cut one character beyond, so that memory stays bounded. */
export const LONGEST_LINE = 1_000_000;

const CHUNK_BYTES = 1 << 18;

/**
 * The lines of a UTF-8 file as a stream; LF, CRLF and lone CR all end a line, a byte-order mark is dropped.
 * Bytes that are not UTF-8 become U+FFFD. Memory does not depend on the length of the file or of its lines.
 * @param chunkBytes how much is read at a time; the lines do not depend on it
 */
export async function* readLines(path: string, chunkBytes = CHUNK_BYTES): AsyncGenerator<LineBatch> {
  const decoder = new TextDecoder('utf-8');
  let rest = '';
  let firstLine = 1;
  for await (const chunk of createReadStream(path, { highWaterMark: chunkBytes })) {
    const text = rest + decoder.decode(chunk as Buffer, { stream: true });
    // A CR at the very end may be the first half of CRLF: leave it for the next chunk.
    const pending = text.endsWith('\r') ? '\r' : '';
    const lines = splitLines(text.slice(0, text.length - pending.length));
    rest = lines.pop()! + pending;
    if (lines.length === 0) continue;
    yield { firstLine, lines };
    firstLine += lines.length;
  }
  const lines = splitLines(rest + decoder.decode());
  if (lines.at(-1) === '') lines.pop();
  if (lines.length > 0) yield { firstLine, lines };
}

function splitLines(text: string): string[] {
  const lines = text.includes('\r') ? text.split(/\r\n|\n|\r/) : text.split('\n');
  // Only the first line can have grown over many chunks.
  if (lines[0]!.length > LONGEST_LINE) lines[0] = lines[0]!.slice(0, LONGEST_LINE + 1);
  return lines;
}
