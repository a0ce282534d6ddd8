import type { SquaredErrors } from './scoring.js';

/** Where each row stands among the distinct lengths. */
interface LengthIndex {
  readonly lengths: Float64Array;
  readonly cellOf: Int32Array;
}

/** Cells are worth their making when there are so many rows to one of them. */
const LEAST_ROWS = 4;

/** A model is often fitted many times to errors at the same lengths, whose order is found once. */
const known = new WeakMap<Float64Array, LengthIndex>();

/**
 * One row for each distinct length, with the sum of the weights and the weighted mean square. The equations of a fit
 * depend on the errors of one length through these two alone, and logs repeat a few marks over and over. Rows of weight
 * 0 take no part. Where lengths hardly repeat the errors come back as they are.
 */
export function sumsByLength(errors: SquaredErrors): SquaredErrors {
  const { y, l, w } = errors;
  let index = known.get(l);
  if (index === undefined) {
    index = lengthIndex(l);
    known.set(l, index);
  }
  const { lengths, cellOf } = index;
  if (lengths.length * LEAST_ROWS > l.length) return errors;
  const weights = new Float64Array(lengths.length);
  const squares = new Float64Array(lengths.length);
  for (let i = 0; i < cellOf.length; i++) {
    const k = cellOf[i]!;
    weights[k]! += w[i]!;
    squares[k]! += w[i]! * y[i]!;
  }
  const kept = Int32Array.from(lengths.keys()).filter((k) => weights[k]! > 0);
  return {
    y: Float64Array.from(kept, (k) => squares[k]! / weights[k]!),
    l: Float64Array.from(kept, (k) => lengths[k]!),
    w: Float64Array.from(kept, (k) => weights[k]!),
  };
}

/** Lengths in the order in which they come, so that sums do not depend on anything else. */
function lengthIndex(l: Float64Array): LengthIndex {
  const places = new Map<number, number>();
  const cellOf = new Int32Array(l.length);
  for (let i = 0; i < l.length; i++) {
    let k = places.get(l[i]!);
    if (k === undefined) {
      k = places.size;
      places.set(l[i]!, k);
    }
    cellOf[i] = k;
  }
  return { lengths: Float64Array.from(places.keys()), cellOf };
}
