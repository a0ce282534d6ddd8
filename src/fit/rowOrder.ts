/**
 * Puts rows in an order that does not depend on how they came: by day, then by each key in turn. Sums depend on order in
 * the last digits, so that a fixed order makes equal data give equal bytes. Stable sorts by byte, the last key first,
 * because comparing a million rows takes ten times as long.
 * @param rows places to be ordered
 * @param days,keys of all rows, not only of those to be ordered; NaN comes last
 */
export function orderRows(
  rows: Int32Array,
  days: readonly string[],
  keys: readonly ArrayLike<number>[],
): Int32Array {
  let ordered = rows;
  for (const key of [...keys].reverse()) ordered = sortedByNumber(ordered, key);
  const names = [...new Set(days)].sort();
  const rank = new Map(names.map((name, d) => [name, d]));
  const dayOf = new Int32Array(ordered.length);
  for (let k = 0; k < ordered.length; k++) dayOf[k] = rank.get(days[ordered[k]!]!)!;
  return scattered(ordered, (k) => dayOf[k]!, names.length);
}

const BYTES = 8;
const LITTLE_ENDIAN = new Uint8Array(Uint16Array.of(1).buffer)[0] === 1;

function sortedByNumber(rows: Int32Array, key: ArrayLike<number>): Int32Array {
  const n = rows.length;
  const values = new Float64Array(n);
  const bytes = new Uint8Array(values.buffer);
  // + 0 makes a negative zero a plain one.
  for (let k = 0; k < n; k++) values[k] = key[rows[k]!]! + 0;
  const byte = (digit: number): number => (LITTLE_ENDIAN ? digit : BYTES - 1 - digit);
  const top = byte(BYTES - 1);
  // As whole numbers, positive doubles ascend and negative ones descend: flip the sign of the former, all of the latter.
  for (let k = 0; k < n; k++) {
    const at = k * BYTES;
    const missing = Number.isNaN(values[k]!);
    if (missing || bytes[at + top]! >= 128) {
      for (let b = 0; b < BYTES; b++) bytes[at + b] = missing ? 255 : bytes[at + b]! ^ 255;
    } else bytes[at + top]! ^= 128;
  }
  let places = new Int32Array(n);
  for (let k = 0; k < n; k++) places[k] = k;
  for (let digit = 0; digit < BYTES; digit++) {
    const offset = byte(digit);
    const before = places;
    places = scattered(before, (k) => bytes[before[k]! * BYTES + offset]!, 256);
  }
  for (let k = 0; k < n; k++) places[k] = rows[places[k]!]!;
  return places;
}

/** Items by a small whole number of their place, those with the same one as they stood. */
function scattered(
  items: Int32Array,
  numberAt: (place: number) => number,
  numbers: number,
): Int32Array<ArrayBuffer> {
  const starts = new Int32Array(numbers + 1);
  for (let k = 0; k < items.length; k++) starts[numberAt(k) + 1]! += 1;
  for (let d = 0; d < numbers; d++) starts[d + 1]! += starts[d]!;
  const ordered = new Int32Array(items.length);
  for (let k = 0; k < items.length; k++) ordered[starts[numberAt(k)]!++] = items[k]!;
  return ordered;
}
