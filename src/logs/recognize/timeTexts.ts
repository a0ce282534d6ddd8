import { compileTimeFormat, guessTimeFormats, parseIsoTime, type TimeGuess } from '../../time/index.js';

/** Fewest texts of a column, as a share, that must be times for it to be one of times. */
export const MOST_OF_THEM = 0.8;
/** Texts that are looked at. */
const MOST_TEXTS = 400;
const SEEDS = 3;

/** Formats that read (nearly) all texts, and the share of texts that they read. */
export interface TextFormats {
  readonly guesses: readonly TimeGuess[];
  readonly share: number;
}

/** What may be meant by texts of times; a few that are damaged do not hide the format of the others. */
export function textFormats(texts: readonly string[]): TextFormats {
  const sample = texts.slice(0, MOST_TEXTS);
  const guesses = guessTimeFormats(sample);
  if (guesses.length > 0) return { guesses, share: 1 };
  const seeds = new Map(
    sample
      .slice(0, SEEDS)
      .flatMap((text) => guessTimeFormats([text]))
      .map(({ format }) => [format, 0]),
  );
  let best: readonly string[] = [];
  for (const format of seeds.keys()) {
    const reads = readerOf(format);
    const read = sample.filter(reads);
    if (read.length > best.length) best = read;
  }
  return { guesses: guessTimeFormats(best), share: sample.length === 0 ? 0 : best.length / sample.length };
}

function readerOf(format: string): (text: string) => boolean {
  if (format === 'iso') return (text) => parseIsoTime(text).kind !== 'invalid';
  const read = compileTimeFormat(format);
  return (text) => read(text) !== null;
}
