import type { FieldValues } from './formatFields.js';
import type { FormatPiece } from './formatTokens.js';
import { monthOfName } from './monthNames.js';

/** Reads one piece of a text from `at` on into `values`; returns where the rest begins, or −1. */
export type FormatStep = (text: string, at: number, values: FieldValues) => number;

/** Digits of a fraction that matter: femtoseconds, exact in a double. */
const MAX_FRACTION_DIGITS = 15;

function digitAt(text: string, at: number): number {
  const digit = text.charCodeAt(at) - 48;
  return digit >= 0 && digit <= 9 ? digit : -1;
}

/** Blanks of all kinds that exports use: some write a narrow no-break space before AM and PM. */
function isBlank(code: number): boolean {
  return code === 32 || code === 9 || code === 0xa0 || code === 0x202f || code === 0x2009;
}

function literalStep(literal: string): FormatStep {
  const { length } = literal;
  if (length === 1) {
    const code = literal.charCodeAt(0);
    return (text, at) => (text.charCodeAt(at) === code ? at + 1 : -1);
  }
  return (text, at) => (text.startsWith(literal, at) ? at + length : -1);
}

function blankStep(text: string, at: number): number {
  let next = at;
  while (isBlank(text.charCodeAt(next))) next += 1;
  return next > at ? next : -1;
}

function numberStep(piece: Extract<FormatPiece, { kind: 'number' }>): FormatStep {
  const { field, least, most, base } = piece;
  return (text, at, values) => {
    let number = 0;
    let next = at;
    for (const end = at + most; next < end; next += 1) {
      const digit = digitAt(text, next);
      if (digit < 0) break;
      number = 10 * number + digit;
    }
    values[field] = base + number;
    return next - at < least ? -1 : next;
  };
}

/** A number of one or two digits that begins a run of numbers with `after` further digits. */
function runStep(piece: Extract<FormatPiece, { kind: 'number' }>, after: number): FormatStep {
  const oneDigit = numberStep({ ...piece, most: 1 });
  const twoDigits = numberStep({ ...piece, least: 2 });
  return (text, at, values) => {
    const isShort = digitAt(text, at + after + 1) < 0;
    return (isShort ? oneDigit : twoDigits)(text, at, values);
  };
}

function fractionStep(text: string, at: number, values: FieldValues): number {
  let digits = 0;
  let scale = 1;
  let next = at;
  for (; ; next += 1) {
    const digit = digitAt(text, next);
    if (digit < 0) break;
    if (next - at < MAX_FRACTION_DIGITS) {
      digits = 10 * digits + digit;
      scale *= 10;
    }
  }
  // divided last: .3 and .123 come out as whole milliseconds
  values.fraction = (digits * 1000) / scale;
  return next > at ? next : -1;
}

/** A fraction after its separator; without separator there is none, as whole seconds are often written without. */
function separatedFractionStep(separator: string): FormatStep {
  const code = separator.charCodeAt(0);
  return (text, at, values) => {
    if (text.charCodeAt(at) === code) return fractionStep(text, at + 1, values);
    values.fraction = 0;
    return at;
  };
}

function monthNameStep(text: string, at: number, values: FieldValues): number {
  let next = at;
  while ((text.charCodeAt(next) | 32) >= 97 && (text.charCodeAt(next) | 32) <= 122) next += 1;
  values.month = monthOfName(text.slice(at, next));
  return values.month === 0 ? -1 : next;
}

/** AM or PM in any case, with or without points. */
function halfDayStep(text: string, at: number, values: FieldValues): number {
  const first = text.charCodeAt(at) | 32;
  if (first !== 97 && first !== 112) return -1;
  values.halfDay = first === 97 ? 0 : 12;
  let next = at + 1;
  if (text.charCodeAt(next) === 46) next += 1;
  if ((text.charCodeAt(next) | 32) !== 109) return -1;
  next += 1;
  return text.charCodeAt(next) === 46 ? next + 1 : next;
}

/** The steps that read the pieces of a format one after the other. */
export function formatSteps(pieces: readonly FormatPiece[]): readonly FormatStep[] {
  return pieces.flatMap((piece, at): readonly FormatStep[] => {
    const next = pieces[at + 1];
    switch (piece.kind) {
      case 'literal':
        return next?.kind === 'fraction' && piece.text.length === 1
          ? [separatedFractionStep(piece.text)]
          : [literalStep(piece.text)];
      case 'blanks':
        return [blankStep];
      case 'fraction': {
        const before = pieces[at - 1];
        return before?.kind === 'literal' && before.text.length === 1 ? [] : [fractionStep];
      }
      case 'monthName':
        return [monthNameStep];
      case 'halfDay':
        return [halfDayStep];
      default: {
        if (piece.least === piece.most || next?.kind !== 'number') return [numberStep(piece)];
        const rest = pieces.slice(at + 1);
        const end = rest.findIndex(({ kind }) => kind !== 'number');
        const run = end < 0 ? rest : rest.slice(0, end);
        return [
          runStep(
            piece,
            run.reduce((sum, p) => sum + (p.kind === 'number' ? p.most : 0), 0),
          ),
        ];
      }
    }
  });
}
