import { quoted } from './quoted.js';

/** A part of a time that a token of a format reads. */
export type TimeField =
  | 'year'
  | 'month'
  | 'day'
  | 'dayOfYear'
  | 'hour'
  | 'hour12'
  | 'minute'
  | 'second'
  | 'fraction'
  | 'halfDay';

/** One piece of a format, in order of reading. */
export type FormatPiece =
  | { readonly kind: 'literal'; readonly text: string }
  | { readonly kind: 'blanks' }
  /** Whole number of `least` to `most` digits, added to `base` (the century of a two-digit year). */
  | {
      readonly kind: 'number';
      readonly field: TimeField;
      readonly least: number;
      readonly most: number;
      readonly base: number;
    }
  | { readonly kind: 'fraction' }
  | { readonly kind: 'monthName' }
  | { readonly kind: 'halfDay' };

/** The tokens of a format, as messages list them. */
export const FORMAT_TOKENS = "yyyy '20'yy M MM MMM d dd DDD H HH h hh m mm s ss SSS a";

/** Least and most digits of the number tokens; two letters read one digit too where no other number stands beside. */
const NUMBERS: Readonly<Record<string, readonly [field: TimeField, least: number, most: number]>> = {
  yyyy: ['year', 4, 4],
  yy: ['year', 2, 2],
  M: ['month', 1, 2],
  MM: ['month', 1, 2],
  d: ['day', 1, 2],
  dd: ['day', 1, 2],
  DDD: ['dayOfYear', 1, 3],
  H: ['hour', 1, 2],
  HH: ['hour', 1, 2],
  h: ['hour12', 1, 2],
  hh: ['hour12', 1, 2],
  m: ['minute', 1, 2],
  mm: ['minute', 1, 2],
  s: ['second', 1, 2],
  ss: ['second', 1, 2],
};

interface Token {
  readonly text: string;
  readonly piece: FormatPiece;
}

/** A text in quotes (`''` stands for a quote, also inside one), letters of one kind, blanks, or one character. */
const PIECES = /'((?:[^']|'')*)'|([A-Za-z])\2*|\s+|./gsu;

/** The error for a format that cannot be meant, with the format as it came. */
export function formatError(expected: string, came: string, format: string): Error {
  return new Error(`format: expected ${expected}, came ${quoted(came)} in ${quoted(format)}`);
}

/**
 * The pieces of a format, neighbouring literals not joined. Number tokens that touch have a fixed width, except that
 * the first of such a run may be a single letter: `Hmmss` reads 90500 and 100500.
 * @throws Error for unknown letters, an open quote, a year without century, or widths that cannot be told apart.
 */
export function formatPieces(format: string): readonly FormatPiece[] {
  const tokens: Token[] = [];
  let century: string | null = null;
  for (const match of format.matchAll(PIECES)) {
    const text = match[0];
    const literal = match[1];
    if (century !== null) {
      tokens.push({
        text,
        piece: { kind: 'number', field: 'year', least: 2, most: 2, base: Number(century) * 100 },
      });
      century = null;
    } else if (literal !== undefined) {
      if (/^\d\d$/.test(literal) && /^yy(?!y)/.test(format.slice(match.index + text.length)))
        century = literal;
      else
        tokens.push({
          text,
          piece: { kind: 'literal', text: literal === '' ? "'" : literal.replaceAll("''", "'") },
        });
    } else tokens.push({ text, piece: plainPiece(text, format) });
  }
  return tokens.map((token, at) => inItsPlace(tokens, at, token, format));
}

/** The piece that an unquoted text of a format stands for. */
function plainPiece(text: string, format: string): FormatPiece {
  const number = NUMBERS[text];
  if (text === 'yy')
    throw formatError("a four-digit year yyyy, or its century stated as in '20'yy", text, format);
  if (number) return { kind: 'number', field: number[0], least: number[1], most: number[2], base: 0 };
  if (text === 'MMM') return { kind: 'monthName' };
  if (text === 'a') return { kind: 'halfDay' };
  if (/^S+$/.test(text)) return { kind: 'fraction' };
  if (text === "'") throw formatError("a closing ' after the text in quotes", text, format);
  if (/^[A-Za-z\d]/.test(text))
    throw formatError(`the tokens ${FORMAT_TOKENS} (other letters and digits as 'text')`, text, format);
  return text.trim() === '' ? { kind: 'blanks' } : { kind: 'literal', text };
}

/** A number piece with the width that its neighbours leave it. */
function inItsPlace(tokens: readonly Token[], at: number, token: Token, format: string): FormatPiece {
  const { text, piece } = token;
  const afterNumber = beginsOrEndsInDigit(tokens[at - 1]?.piece, 'end');
  const next = tokens[at + 1]?.piece;
  const beforeNumber = beginsOrEndsInDigit(next, 'start');
  if (piece.kind === 'fraction' && beforeNumber)
    throw formatError(
      'no number directly after a fraction of seconds, whose length is open',
      text + tokens[at + 1]!.text,
      format,
    );
  if (piece.kind !== 'number' || !(afterNumber || beforeNumber || next?.kind === 'fraction')) return piece;
  if (text === 'yyyy' || text === 'yy' || text === 'DDD') return { ...piece, least: piece.most };
  if (text.length === 2) return { ...piece, least: 2 };
  const runIsFixed = tokens.slice(at + 1).findIndex(({ piece: p }) => p.kind !== 'number');
  const end = runIsFixed < 0 ? undefined : tokens[at + 1 + runIsFixed]?.piece;
  if (afterNumber || beginsOrEndsInDigit(end, 'start') || end?.kind === 'fraction')
    throw formatError(`${text}${text}, as numbers stand directly beside it`, text, format);
  return piece;
}

function beginsOrEndsInDigit(piece: FormatPiece | undefined, side: 'start' | 'end'): boolean {
  if (piece?.kind === 'number') return true;
  if (piece?.kind !== 'literal') return piece?.kind === 'fraction' && side === 'end';
  return side === 'start' ? /^\d/.test(piece.text) : /\d$/.test(piece.text);
}
