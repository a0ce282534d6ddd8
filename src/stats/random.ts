import { xoroshiro128plusFromState } from 'pure-rand/generator/xoroshiro128plus';

/** Source of numbers drawn evenly from [0, 1). */
export type Random = () => number;

/** Mixes all bits of a 32-bit word (finaliser of MurmurHash3, Appleby, public domain). */
function mixed(word: number): number {
  let h = word;
  h = Math.imul(h ^ (h >>> 16), 0x85ebca6b);
  h = Math.imul(h ^ (h >>> 13), 0xc2b2ae35);
  return h ^ (h >>> 16);
}

/** 32-bit FNV-1a hash (Fowler, Noll, Vo) of the text's UTF-16 units, begun differently for each `lane`. */
function hashWord(text: string, lane: number): number {
  let h = mixed(0x811c9dc5 + lane);
  for (let i = 0; i < text.length; i += 1) {
    const unit = text.charCodeAt(i);
    h = Math.imul(h ^ (unit & 0xff), 0x01000193);
    h = Math.imul(h ^ (unit >>> 8), 0x01000193);
  }
  return mixed(h);
}

/**
 * A stream of numbers in [0, 1), each a multiple of 2⁻⁵³. Equal seed and label give the same stream; seed and label are
 * hashed into the generator's 128 bits, so that neighbouring seeds or labels are unrelated. Generator: xoroshiro128+
 * (Blackman & Vigna 2018) of pure-rand; its weak lowest bits are not used.
 * @param label names the purpose, so that one study seed serves several independent streams.
 * @throws RangeError when the seed is not finite.
 */
export function randomStream(seed: number, label = ''): Random {
  if (!Number.isFinite(seed)) throw new RangeError(`seed: expected a finite number, received ${seed}`);
  const text = `${seed}|${label}`;
  const state = [1, 2, 3, 4].map((lane) => hashWord(text, lane));
  // a state of zeros would stay zero for ever
  if (!state.some((word) => word !== 0)) state[0] = 1;
  const generator = xoroshiro128plusFromState(state);
  return () => {
    const high = generator.next() >>> 5;
    const low = generator.next() >>> 6;
    return (high * 2 ** 26 + low) * 2 ** -53;
  };
}

/** Standard normal deviates from a stream: polar method (Marsaglia & Bray 1964); both of each pair are used. */
export function normalDeviates(random: Random): () => number {
  let spare: number | undefined;
  return () => {
    if (spare !== undefined) {
      const value = spare;
      spare = undefined;
      return value;
    }
    for (;;) {
      const x = 2 * random() - 1;
      const y = 2 * random() - 1;
      const s = x * x + y * y;
      if (s > 0 && s < 1) {
        const factor = Math.sqrt((-2 * Math.log(s)) / s);
        spare = y * factor;
        return x * factor;
      }
    }
  };
}

/**
 * A number drawn evenly from [low, high) (high itself only by rounding).
 * @throws RangeError when low > high or either is not finite.
 */
export function uniformBetween(random: Random, low: number, high: number): number {
  if (!(low <= high && Number.isFinite(high - low)))
    throw new RangeError(`low, high: expected finite numbers in order, received ${low}, ${high}`);
  return low + (high - low) * random();
}

/** A new array with the values in random order, every order equally likely (Fisher & Yates). */
export function shuffle<T>(values: readonly T[], random: Random): T[] {
  const result = [...values];
  for (let i = result.length - 1; i > 0; i -= 1) {
    const j = Math.floor(random() * (i + 1));
    [result[i], result[j]] = [result[j] as T, result[i] as T];
  }
  return result;
}
