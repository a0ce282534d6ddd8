import { detectEncoding, type Encoding } from '../byteChunks.js';

/** A line of the head of a file. */
export interface HeadLine {
  /** From 1. */
  readonly row: number;
  readonly text: string;
}

/** The first lines of a file as text. */
export interface HeadText {
  readonly text: string;
  readonly lines: readonly HeadLine[];
  readonly encoding: Encoding;
  /** The encoding was concluded from bytes that are no UTF-8. */
  readonly guessed: boolean;
}

/** As much as readHead gives: a head of this size was probably cut inside a line. */
const FULL_HEAD_BYTES = 1 << 16;

/**
 * Decodes the first bytes of a file; LF, CRLF and lone CR end a line, a byte-order mark is dropped.
 * @param known encoding, where the bytes need not tell it
 */
export function headText(head: Buffer, known?: Encoding): HeadText {
  const { encoding, guessed } =
    known === undefined ? detectEncoding(head) : { encoding: known, guessed: false };
  const decoded = new TextDecoder(encoding === 'latin1' ? 'windows-1252' : encoding).decode(head);
  const lines = decoded.split(/\r\n|\n|\r/);
  const whole = head.length < FULL_HEAD_BYTES || lines.length < 2 ? lines : lines.slice(0, -1);
  return {
    text: whole.join('\n'),
    lines: whole.map((text, k) => ({ row: k + 1, text })),
    encoding,
    guessed: guessed && encoding === 'latin1',
  };
}
