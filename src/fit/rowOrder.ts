/**
 * Puts rows in an order that does not depend on how they came: by day, then by each key in turn. Sums depend on order in
 * the last digits, so that a fixed order makes equal data give equal bytes. The first key is sorted by its digits, because
 * comparing a million rows takes many times as long; the others only decide among equals.
 * @param rows places to be ordered
 * @param days,keys of all rows, not only of those to be ordered; NaN comes last
 */
export function orderRows(
  rows: Int32Array,
  days: readonly string[],
  [first, ...others]: readonly ArrayLike<number>[],
): Int32Array {
  const ordered = first === undefined ? rows : sortedByNumber(rows, first);
  const ranks = rankOf(days);
  const dayOf = new Uint32Array(ordered.length);
  for (let k = 0; k < dayOf.length; k++) dayOf[k] = ranks[ordered[k]!]!;
  const byDay = scattered(ordered, dayOf, ranks.reduce((a, b) => Math.max(a, b), 0) + 1);
  if (first === undefined || others.length === 0) return byDay;
  const place = placesOf(rows);
  const equal = (i: number, j: number): boolean =>
    ranks[i] === ranks[j] && compare(first[i]!, first[j]!) === 0;
  for (let from = 0; from < byDay.length; ) {
    let to = from + 1;
    while (to < byDay.length && equal(byDay[from]!, byDay[to]!)) to += 1;
    if (to - from > 1) {
      byDay.subarray(from, to).sort((i, j) => {
        for (const key of others) {
          const order = compare(key[i]!, key[j]!);
          if (order !== 0) return order;
        }
        return place[i]! - place[j]!;
      });
    }
    from = to;
  }
  return byDay;
}

/** Where each row stood among the rows to be ordered. */
function placesOf(rows: Int32Array): Int32Array {
  const places = new Int32Array(rows.reduce((a, b) => Math.max(a, b), -1) + 1);
  for (let k = 0; k < rows.length; k++) places[rows[k]!] = k;
  return places;
}

/** Ascending, both zeros alike, NaN last. */
function compare(a: number, b: number): number {
  if (a < b) return -1;
  if (a > b) return 1;
  if (a === b) return 0;
  return Number(Number.isNaN(a)) - Number(Number.isNaN(b));
}

/** Place of each name in the order of names. */
export function rankOf(names: readonly string[]): Int32Array {
  const rank = new Map([...new Set(names)].sort().map((name, k) => [name, k]));
  const ranks = new Int32Array(names.length);
  for (let i = 0; i < ranks.length; i++) ranks[i] = rank.get(names[i]!)!;
  return ranks;
}

/** From so many rows on digits have 16 bits; for fewer a table of 65 536 counts would be the longest part. */
const MANY_ROWS = 30_000;
const LITTLE_ENDIAN = new Uint8Array(Uint16Array.of(1).buffer)[0] === 1;

function sortedByNumber(rows: Int32Array, key: ArrayLike<number>): Int32Array {
  const n = rows.length;
  const values = new Float64Array(n);
  const halves = new Uint32Array(values.buffer);
  const [low, high] = LITTLE_ENDIAN ? [0, 1] : [1, 0];
  // + 0 makes a negative zero a plain one.
  for (let k = 0; k < n; k++) values[k] = key[rows[k]!]! + 0;
  // As whole numbers, positive doubles ascend and negative ones descend: flip the sign of the former, all of the latter.
  for (let k = 0; k < n; k++) {
    const missing = Number.isNaN(values[k]!);
    const upper = halves[2 * k + high]!;
    const flip = upper >= 0x80000000 ? 0xffffffff : 0;
    halves[2 * k + low] = missing ? 0xffffffff : halves[2 * k + low]! ^ flip;
    halves[2 * k + high] = missing ? 0xffffffff : upper ^ (flip === 0 ? 0x80000000 : flip);
  }
  const bits = n < MANY_ROWS ? 8 : 16;
  const numbers = 2 ** bits;
  const digits = new Uint32Array(n);
  let places = Int32Array.from(rows.keys());
  for (const half of [low, high]) {
    for (let shift = 0; shift < 32; shift += bits) {
      for (let k = 0; k < n; k++) digits[k] = (halves[2 * places[k]! + half]! >>> shift) & (numbers - 1);
      places = scattered(places, digits, numbers);
    }
  }
  return places.map((place) => rows[place]!);
}

/** Items by the digit of their place, those with the same one as they stood. */
function scattered(items: Int32Array, digits: Uint32Array, numbers: number): Int32Array<ArrayBuffer> {
  const starts = new Int32Array(numbers + 1);
  for (let k = 0; k < items.length; k++) starts[digits[k]! + 1]! += 1;
  for (let d = 0; d < numbers; d++) starts[d + 1]! += starts[d]!;
  const ordered = new Int32Array(items.length);
  for (let k = 0; k < items.length; k++) ordered[starts[digits[k]!]!++] = items[k]!;
  return ordered;
}
