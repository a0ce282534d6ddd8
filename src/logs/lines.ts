import { createReadStream } from 'node:fs';

/** A run of consecutive lines of a text file. */
export interface LineBatch {
  /** Line number of `lines[0]`, from 1. */
  readonly firstLine: number;
  readonly lines: readonly string[];
}

/** A line longer than this is not a line of a position log: the text is cut there, so that memory stays bounded. */
const LONGEST_LINE = 1_000_000;

/**
 * The lines of a UTF-8 file as a stream; LF, CRLF and lone CR all end a line, a byte-order mark is dropped.
 * Bytes that are not UTF-8 become U+FFFD. Memory does not depend on the length of the file.
 */
export async function* readLines(path: string): AsyncGenerator<LineBatch> {
  const decoder = new TextDecoder('utf-8');
  let rest = '';
  let firstLine = 1;
  for await (const chunk of createReadStream(path, { highWaterMark: 1 << 18 })) {
    const text = rest + decoder.decode(chunk as Buffer, { stream: true });
    // A CR at the very end may be the first half of CRLF: leave it for the next chunk.
    const lines = splitLines(text, text.endsWith('\r') ? text.length - 1 : text.length);
    rest = lines.pop()! + (text.endsWith('\r') ? '\r' : '');
    if (rest.length > LONGEST_LINE) {
      lines.push(rest.slice(0, LONGEST_LINE));
      rest = rest.slice(LONGEST_LINE);
    }
    if (lines.length === 0) continue;
    yield { firstLine, lines };
    firstLine += lines.length;
  }
  rest += decoder.decode();
  const lines = splitLines(rest, rest.length);
  if (lines.at(-1) === '') lines.pop();
  if (lines.length > 0) yield { firstLine, lines };
}

function splitLines(text: string, end: number): string[] {
  const body = text.slice(0, end);
  return body.includes('\r') ? body.split(/\r\n|\n|\r/) : body.split('\n');
}
