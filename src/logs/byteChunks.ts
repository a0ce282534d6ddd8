import { createReadStream } from 'node:fs';
import { open } from 'node:fs/promises';

/** How the bytes of a file become text. */
export type Encoding = 'utf-8' | 'utf-16le' | 'utf-16be' | 'latin1';

export const ENCODINGS: readonly Encoding[] = ['utf-8', 'utf-16le', 'utf-16be', 'latin1'];

/** Whole lines of a file as UTF-8 bytes: a run from `start` to `end` (exclusive) of `bytes`. */
export interface LineChunk {
  readonly bytes: Buffer;
  /** The last line of the file has no line end, so it may have been cut off. */
  readonly unterminated: boolean;
}

const CHUNK_BYTES = 1 << 18;
/** A longer line is no line of a position log; what follows of it is passed over, so that memory stays bounded. */
export const LONGEST_LINE_BYTES = 1_000_000;

const LF = 0x0a;
const CR = 0x0d;

/**
 * The encoding that the first bytes show: a byte-order mark, zeros in every second byte, or bytes that are no UTF-8
 * (then the one-byte code of western Europe is meant more often than anything else, and this is told).
 */
export function detectEncoding(head: Buffer): { readonly encoding: Encoding; readonly guessed: boolean } {
  if (head[0] === 0xff && head[1] === 0xfe) return { encoding: 'utf-16le', guessed: false };
  if (head[0] === 0xfe && head[1] === 0xff) return { encoding: 'utf-16be', guessed: false };
  const zeros = [0, 0];
  for (let k = 0; k < head.length; k++) if (head[k] === 0) zeros[k % 2]! += 1;
  const many = head.length / 5;
  if (zeros[1]! > many && zeros[0]! < many / 20) return { encoding: 'utf-16le', guessed: true };
  if (zeros[0]! > many && zeros[1]! < many / 20) return { encoding: 'utf-16be', guessed: true };
  const latin1 = looksLikeLatin1(head);
  return { encoding: latin1 ? 'latin1' : 'utf-8', guessed: latin1 };
}

const HEAD_BYTES = 1 << 16;

/** The first bytes of a file. */
export async function readHead(path: string): Promise<Buffer> {
  const file = await open(path, 'r');
  try {
    const { buffer, bytesRead } = await file.read(Buffer.alloc(HEAD_BYTES), 0, HEAD_BYTES, 0);
    return buffer.subarray(0, bytesRead);
  } finally {
    await file.close();
  }
}

/** Letters beyond ASCII in UTF-8. */
const UTF8_LETTER = /[\xc2-\xdf][\x80-\xbf]|[\xe0-\xef][\x80-\xbf]{2}|[\xf0-\xf4][\x80-\xbf]{3}/g;

/** Whether more bytes are no UTF-8 than letters are: a single bad byte does not turn the letters of a file into others. */
function looksLikeLatin1(head: Buffer): boolean {
  // The head may end inside a letter.
  const bytes = head.toString('latin1').replace(/[\xc2-\xf4][\x80-\xbf]{0,2}$/, '');
  const letters = bytes.match(UTF8_LETTER) ?? [];
  const high = bytes.match(/[\x80-\xff]/g)?.length ?? 0;
  const stray = high - letters.reduce((total, { length }) => total + length, 0);
  return stray > letters.length;
}

/**
 * A file as chunks of whole lines in UTF-8, whatever its encoding. LF, CRLF and lone CR end a line. A byte-order mark
 * is dropped. Memory does not depend on the length of the file or of its lines.
 * @param chunkBytes how much is read at a time; the lines do not depend on it
 */
export async function* readLineChunks(
  path: string,
  encoding: Encoding,
  chunkBytes = CHUNK_BYTES,
): AsyncGenerator<LineChunk> {
  const decoder =
    encoding === 'utf-8' ? null : new TextDecoder(encoding === 'latin1' ? 'windows-1252' : encoding);
  let rest: Buffer = Buffer.alloc(0);
  let first = true;
  for await (const piece of createReadStream(path, { highWaterMark: chunkBytes })) {
    let bytes =
      decoder === null ? (piece as Buffer) : Buffer.from(decoder.decode(piece as Buffer, { stream: true }));
    if (rest.length > 0) bytes = Buffer.concat([rest, bytes]);
    if (first) {
      // Three bytes tell a byte-order mark; a shorter first piece waits for more.
      if (bytes.length < 3) {
        rest = bytes;
        continue;
      }
      bytes = withoutMark(bytes);
      first = false;
    }
    const end = lastLineEnd(bytes);
    if (end > 0) yield { bytes: bytes.subarray(0, end), unterminated: false };
    rest = shortened(bytes.subarray(end));
  }
  const tail = decoder === null ? rest : Buffer.concat([rest, Buffer.from(decoder.decode())]);
  const last = first ? withoutMark(tail) : tail;
  if (last.length > 0) {
    const end = last.at(-1) === CR;
    yield { bytes: last, unterminated: !end };
  }
}

/** A copy of what waits for its line end; of a line that is too long the beginning, and the CR that may end it. */
function shortened(rest: Buffer): Buffer {
  if (rest.length <= LONGEST_LINE_BYTES + 1) return Buffer.from(rest);
  const beginning = rest.subarray(0, LONGEST_LINE_BYTES + 1);
  return Buffer.concat(rest.at(-1) === CR ? [beginning, Buffer.of(CR)] : [beginning]);
}

const withoutMark = (bytes: Buffer): Buffer =>
  bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf ? bytes.subarray(3) : bytes;

/** One past the last line end; a CR at the very end may be half of CRLF and stays for the next chunk. */
function lastLineEnd(bytes: Buffer): number {
  const usable = bytes.at(-1) === CR ? bytes.length - 1 : bytes.length;
  const lf = bytes.lastIndexOf(LF, usable - 1);
  const cr = bytes.lastIndexOf(CR, usable - 1);
  return usable === 0 ? 0 : Math.max(lf, cr) + 1;
}

/** Calls back with the start and end of each line of a chunk; a line end itself belongs to no line. */
export function forEachLine(bytes: Buffer, take: (start: number, end: number) => void): void {
  let start = 0;
  // The search for one byte is many times faster than a look at each; most files have no CR at all.
  if (!bytes.includes(CR)) {
    for (let at = bytes.indexOf(LF); at >= 0; at = bytes.indexOf(LF, start)) {
      take(start, at);
      start = at + 1;
    }
  } else {
    for (let at = 0; at < bytes.length; at++) {
      const byte = bytes[at]!;
      if (byte !== LF && byte !== CR) continue;
      take(start, at);
      if (byte === CR && bytes[at + 1] === LF) at++;
      start = at + 1;
    }
  }
  if (start < bytes.length) take(start, bytes.length);
}
