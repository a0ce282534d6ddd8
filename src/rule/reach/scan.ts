/** Lengths are tried in these steps, outward from the base. */
export const STEP_KM = 0.1;
/** How much farther a look ahead goes. */
const AHEAD = 1.4;

/** How far something holds. */
export interface Reached {
  readonly km: number;
  /** It holds as far as was asked for. */
  readonly capped: boolean;
}

/**
 * The largest length up to a last one at which something holds there and at all shorter lengths, in steps of 0.1 km; the
 * last length itself when it holds throughout.
 */
export function reach(holds: (km: number) => boolean, lastKm: number): Reached {
  let steps = 0;
  while ((steps + 1) * STEP_KM <= lastKm && holds((steps + 1) / 10)) steps += 1;
  const capped = (steps + 1) * STEP_KM > lastKm && holds(lastKm);
  return { km: capped ? lastKm : steps / 10, capped };
}

/** The same for something costly that, once it fails, fails at all greater lengths. */
export function reachByHalves(holds: (km: number) => boolean, lastKm: number): Reached {
  if (holds(lastKm)) return { km: lastKm, capped: true };
  let [low, high] = [0, Math.floor(lastKm / STEP_KM) + 1];
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (holds(middle / 10)) low = middle;
    else high = middle;
  }
  return { km: low / 10, capped: false };
}

/** The point itself at which something that holds near the base ceases to, to a micrometre; 0 where it never holds. */
export function reachExactly(holds: (km: number) => boolean, lastKm: number): number {
  if (holds(lastKm)) return lastKm;
  let [low, high] = [0, lastKm];
  while (high - low > 1e-9) {
    const middle = (low + high) / 2;
    if (holds(middle)) low = middle;
    else high = middle;
  }
  return low < 2e-9 ? 0 : low;
}

/**
 * The same question for something costly that, once it fails, fails at all greater lengths: asked in small steps outward
 * it looks ahead and remembers, so that most answers cost nothing.
 */
export function monotone(holds: (km: number) => boolean): (km: number) => boolean {
  let [held, failed] = [0, Number.POSITIVE_INFINITY];
  return (km) => {
    if (km <= held) return true;
    if (km >= failed) return false;
    const ahead = Math.min(AHEAD * km + STEP_KM, (km + failed) / 2);
    if (holds(ahead)) {
      held = ahead;
      return true;
    }
    failed = ahead;
    const here = holds(km);
    if (here) held = km;
    else failed = km;
    return here;
  };
}
