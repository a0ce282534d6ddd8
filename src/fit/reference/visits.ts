/** Who stood where and when: what tells one visit from the next. */
export interface VisitInput {
  readonly setup: readonly string[];
  readonly mark: readonly string[];
  /** Null: one rover. */
  readonly rover: readonly string[] | null;
  /** UTC ms; NaN for occupations without a time of day, which form one visit a mark. */
  readonly startMs: Float64Array;
}

/** Occupations of one rover on one mark in unbroken order within a setup. */
export interface Visits {
  /** Visit of each occupation, from 0. */
  readonly visitOf: Int32Array;
  readonly count: number;
}

/** A visit ends when mark, rover or setup changes in time order within the setup. */
export function visitsOf({ setup, mark, rover, startMs }: VisitInput): Visits {
  const time = startMs.map((value) => (Number.isNaN(value) ? Number.MAX_VALUE : value));
  const order = Array.from(setup.keys()).sort(
    (i, j) =>
      compare(setup[i]!, setup[j]!) ||
      compare(rover?.[i] ?? '', rover?.[j] ?? '') ||
      time[i]! - time[j]! ||
      compare(mark[i]!, mark[j]!),
  );
  const visitOf = new Int32Array(setup.length);
  let count = 0;
  order.forEach((i, k) => {
    const before = order[k - 1];
    const same =
      before !== undefined &&
      setup[i] === setup[before] &&
      mark[i] === mark[before] &&
      rover?.[i] === rover?.[before];
    if (!same) count += 1;
    visitOf[i] = count - 1;
  });
  return { visitOf, count };
}

const compare = (a: string, b: string): number => (a < b ? -1 : a > b ? 1 : 0);

/** Smallest sector that holds all directions, degrees; 0 for a single one. */
export function azimuthSpread(azimuthsDeg: readonly number[]): number {
  const sorted = [...azimuthsDeg].sort((a, b) => a - b);
  if (sorted.length === 0) return 0;
  const gaps = sorted.map((azimuth, k) =>
    k === 0 ? azimuth + 360 - sorted.at(-1)! : azimuth - sorted[k - 1]!,
  );
  return 360 - Math.max(...gaps);
}
