import { uniformInt } from './chance.js';

/** A part of a log: a line with its line end, as it was or damaged. */
interface Piece {
  bytes: Buffer;
  /** Number of the line from 1 that it comes from. */
  readonly origin: number;
  touched: boolean;
}

/** A damaged log, and which of its lines are still whole. */
export interface Mutated {
  readonly bytes: Buffer;
  /** Line of the log as it was → line of the damaged log in which the same text stands, for lines that nothing touched. */
  readonly whole: ReadonlyMap<number, number>;
  /** Lines as they were of which a copy or the line itself was damaged. */
  readonly damaged: ReadonlySet<number>;
  readonly what: readonly string[];
}

const [LF, CR] = [0x0a, 0x0d];
const LINE_ENDS = ['\n', '\r', '\r\n', '\n\r', '\n\n', '\r\n\r\n'].map((text) => Buffer.from(text));

type Mutation = (pieces: Piece[], random: () => number) => void;

const pick = <T>(list: readonly T[], random: () => number): T => list[uniformInt(random, list.length)]!;

/** Replaces bytes of one piece; its line end may be among them. */
function splice(piece: Piece, at: number, length: number, by: Buffer): void {
  piece.bytes = Buffer.concat([piece.bytes.subarray(0, at), by, piece.bytes.subarray(at + length)]);
  piece.touched = true;
}

const endLength = ({ bytes }: Piece): number =>
  bytes.at(-1) === LF ? (bytes.at(-2) === CR ? 2 : 1) : bytes.at(-1) === CR ? 1 : 0;

/** A damage that happens at some place of some line. */
const somewhere =
  (
    insert: (random: () => number) => Buffer,
    replaced: (random: () => number) => number = () => 0,
  ): Mutation =>
  (pieces, random) => {
    const piece = pick(pieces, random);
    splice(piece, uniformInt(random, piece.bytes.length + 1), replaced(random), insert(random));
  };

/** A damage of one cell, its delimiters guessed from the line. */
const inCell =
  (change: (cell: string, random: () => number) => string): Mutation =>
  (pieces, random) => {
    const piece = pick(pieces, random);
    const body = piece.bytes.length - endLength(piece);
    const cells = [...piece.bytes.toString('latin1', 0, body).matchAll(/[^,;\t| ]+/g)];
    if (cells.length === 0) return;
    const cell = pick(cells, random);
    splice(piece, cell.index, cell[0].length, Buffer.from(change(cell[0], random), 'latin1'));
  };

const HUGE = [
  '1e308',
  '1e309',
  '-1e999',
  `${'9'.repeat(400)}`,
  '0.'.padEnd(400, '0'),
  '-0',
  '1e-400',
  '٣',
  'NaN',
  'Infinity',
  '0x7f',
  '1_0',
  '999999999999999999999',
];
const QUOTES = ['"', '""', '"""', '"a""b"', '"\n"', '","', "'", '“', '"a"b"'];

const MUTATIONS: Readonly<Record<string, Mutation>> = {
  cut: somewhere(
    () => Buffer.alloc(0),
    (random) => 1 + uniformInt(random, 12),
  ),
  cutLine(pieces, random) {
    pieces.splice(uniformInt(random, pieces.length), 1);
  },
  doubledBytes(pieces, random) {
    const piece = pick(pieces, random);
    const at = uniformInt(random, piece.bytes.length);
    const end = Math.min(piece.bytes.length, at + 1 + uniformInt(random, 40));
    splice(piece, at, 0, Buffer.from(piece.bytes.subarray(at, end)));
  },
  doubledLine(pieces, random) {
    const at = uniformInt(random, pieces.length);
    pieces.splice(at, 0, { ...pieces[at]!, touched: true });
  },
  swappedBytes(pieces, random) {
    const piece = pick(pieces, random);
    const at = uniformInt(random, Math.max(1, piece.bytes.length - 1));
    const pair = piece.bytes.subarray(at, at + 2);
    if (pair.length === 2 && pair[0] !== pair[1]) splice(piece, at, 2, Buffer.of(pair[1]!, pair[0]!));
  },
  swappedLines(pieces, random) {
    const [a, b] = [uniformInt(random, pieces.length), uniformInt(random, pieces.length)];
    [pieces[a], pieces[b]] = [pieces[b]!, pieces[a]!];
  },
  inserted: somewhere((random) =>
    Buffer.from(Array.from({ length: 1 + uniformInt(random, 8) }, () => uniformInt(random, 256))),
  ),
  invalidUtf8: somewhere((random) =>
    Buffer.from(pick([[0xff], [0xc3], [0xe2, 0x82], [0xf0, 0x9f], [0x80]], random)),
  ),
  otherText: somewhere((random) =>
    Buffer.from(pick(['測点', '\ufeff', '\u00a0', '\u2028', '🛰', '\u0085', 'é'], random)),
  ),
  wrongDelimiter(pieces, random) {
    const piece = pick(pieces, random);
    const other = pick([',', ';', '\t', '|', ' ', '.'], random);
    const body = piece.bytes.length - endLength(piece);
    const text = piece.bytes.toString('latin1', 0, body).replace(/[,;\t]/g, other);
    splice(piece, 0, body, Buffer.from(text, 'latin1'));
  },
  hugeNumber: inCell((_, random) => pick(HUGE, random)),
  emptyCell: inCell((_, random) => pick(['', '', ' ', '\t', '\u00a0'], random)),
  signs: inCell((cell, random) => pick(['-', '+', '--'], random) + cell),
  lineEnd(pieces, random) {
    const piece = pick(pieces, random);
    piece.bytes = Buffer.concat([
      piece.bytes.subarray(0, piece.bytes.length - endLength(piece)),
      pick(LINE_ENDS, random),
    ]);
  },
  lineEndInside: somewhere((random) => pick(LINE_ENDS, random)),
  quotes: somewhere((random) => Buffer.from(pick(QUOTES, random))),
  nul: somewhere((random) => Buffer.alloc(1 + uniformInt(random, 3))),
  longRun: somewhere((random) => {
    // Once in a while longer than any line may be.
    const length = random() < 0.02 ? 1_000_100 : 1 + uniformInt(random, 20_000);
    return Buffer.alloc(
      length,
      pick(['x', '9', ',', ';', ' ', '"', '\u0000', '$', '\t', '.', '-', '\n'], random),
    );
  }),
  truncated(pieces, random) {
    const at = uniformInt(random, pieces.length);
    const piece = pieces[at]!;
    splice(piece, uniformInt(random, piece.bytes.length), piece.bytes.length, Buffer.alloc(0));
    pieces.splice(at + 1);
  },
};

/** The lines of a file with their line ends. */
function piecesOf(bytes: Buffer): Piece[] {
  const starts = lineStarts(bytes);
  return starts.map((start, k) => ({
    bytes: bytes.subarray(start, starts[k + 1] ?? bytes.length),
    origin: k + 1,
    touched: false,
  }));
}

/** Where lines begin; CRLF, LF and CR end one. A line end at the very end begins no other. */
export function lineStarts(bytes: Buffer): number[] {
  const starts = bytes.length > 0 ? [0] : [];
  for (let at = 0; at < bytes.length - 1; at++) {
    const ends = bytes[at] === LF || (bytes[at] === CR && bytes[at + 1] !== LF);
    if (ends) starts.push(at + 1);
  }
  return starts;
}

/** Damages a log in one to three places, as bad lines, careless editors and joined files do. */
export function mutate(log: Buffer, random: () => number): Mutated {
  const pieces = piecesOf(log);
  const all = new Map(pieces.map(({ origin, bytes }) => [origin, bytes]));
  const what: string[] = [];
  for (let count = 1 + uniformInt(random, 3); count > 0 && pieces.length > 0; count--) {
    const name = pick(Object.keys(MUTATIONS), random);
    MUTATIONS[name]!(pieces, random);
    what.push(name);
  }
  const bytes = Buffer.concat(pieces.map((piece) => piece.bytes));
  const lineAt = new Map(lineStarts(bytes).map((start, k) => [start, k + 1]));
  const whole = new Map<number, number>();
  const damaged = new Set(all.keys());
  let at = 0;
  for (const { bytes: own, origin, touched } of pieces) {
    const line = lineAt.get(at);
    at += own.length;
    // A line that lost its line end, or the one before it, is one with its neighbour.
    const apart = line !== undefined && (at === bytes.length || lineAt.has(at));
    if (!touched && apart) {
      whole.set(origin, line);
      damaged.delete(origin);
    }
  }
  for (const { origin, touched, bytes: own } of pieces) {
    if (touched && !own.equals(all.get(origin)!)) damaged.add(origin);
  }
  return { bytes, whole, damaged, what };
}
