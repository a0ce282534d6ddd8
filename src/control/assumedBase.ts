import type { Base } from './bases.js';

/** Without a stated size an assumed coordinate is taken to be as good as a position without corrections. */
const COMMON_M = 5;
/** Below this size, 0.01 ppm, nothing needs to be said. */
const LEAST_M = 0.2;

/** A base whose own coordinate is assumed, or known so poorly that it stretches baselines. */
export interface AssumedBase {
  /** Size of its error in all three directions, one standard deviation, m. */
  readonly sizeM: number;
  /** The size is stated; else it is the common one. */
  readonly stated: boolean;
  /** Its source says that it is assumed. */
  readonly assumed: boolean;
}

/** Whether a base is such a one; null for a base that is known well, or of which nothing is stated. */
export function assumedBase({ source, horizontalSigmaMm, verticalSigmaMm }: Base): AssumedBase | null {
  const statedM = Math.hypot(horizontalSigmaMm || 0, horizontalSigmaMm || 0, verticalSigmaMm || 0) / 1000;
  const assumed = ['assumed', 'autonomous'].some((word) => holdsWords(source, word));
  if (!assumed && statedM < LEAST_M) return null;
  return { sizeM: statedM > 0 ? statedM : COMMON_M, stated: statedM > 0, assumed };
}

/** Whether a text such as `static from B1, 2023` holds a name as words of its own, in any case. */
export function holdsWords(text: string, name: string): boolean {
  const [plain, wanted] = [text.toLowerCase(), name.toLowerCase()];
  const isWord = (character: string | undefined): boolean =>
    character !== undefined && /[\p{L}\p{N}_-]/u.test(character);
  for (let at = plain.indexOf(wanted); at >= 0; at = plain.indexOf(wanted, at + 1)) {
    if (!isWord(plain[at - 1]) && !isWord(plain[at + wanted.length])) return true;
  }
  return false;
}
