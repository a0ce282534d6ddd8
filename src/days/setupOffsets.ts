import { groupIndices } from '../errors/index.js';
import type { FitData } from '../fit/index.js';
import { fCdf, median } from '../stats/index.js';
import type { DayModel } from './dayModel.js';

/** Median of chi-square with one degree of freedom. */
const MEDIAN_CHI_SQUARE = 0.454936423119572;

/** An offset common to all shots of a base setup on one day. */
export interface SetupOffset {
  readonly day: string;
  readonly setup: string;
  /** East and north, or up, mm. */
  readonly offsetMm: readonly number[];
  /** Standard error of each axis by the scatter of the shots, mm. */
  readonly standardErrorMm: number;
  /** Rows of data. */
  readonly rows: readonly number[];
}

/**
 * Weighted mean error of every setup on every day. Weights follow the variance that the day itself had, so that on a
 * day of large ppm the offset rests on the near shots.
 */
export function setupOffsets({ dayEstimates, posterior }: DayModel): SetupOffset[] {
  if (posterior === null || posterior.data.setup === null) return [];
  const { A, effectiveShare, data } = posterior;
  const slopes = new Map(dayEstimates.map(({ day, ppm }) => [day, ppm.estimate ** 2]));
  const keys = data.day.map((day, i) => JSON.stringify([day, data.setup![i]!]));
  const axes = data.components.length;
  return [...groupIndices(keys).values()].flatMap((rows) => {
    const day = data.day[rows[0]!]!;
    // Of a radial variance each axis has half.
    const weight = (i: number): number => (axes * data.w[i]!) / (A + slopes.get(day)! * data.l[i]!);
    const total = rows.reduce((sum, i) => sum + weight(i), 0);
    if (!(total > 0)) return [];
    return [
      {
        day,
        setup: data.setup![rows[0]!]!,
        offsetMm: data.components.map((e) => rows.reduce((sum, i) => sum + weight(i) * e[i]!, 0) / total),
        standardErrorMm: 1 / Math.sqrt(effectiveShare * total),
        rows,
      },
    ];
  });
}

/** An offset against those of other days. */
export interface OffsetTest {
  /** Length of the offset, mm, and what is usual on other days. */
  readonly offsetMm: number;
  readonly usualMm: number;
  readonly pValue: number;
}

/**
 * Tests an offset by its own standard error and the robust spread of the offsets of other days; null with fewer than
 * three others.
 */
export function testOffset(own: SetupOffset, all: readonly SetupOffset[]): OffsetTest | null {
  const others = all.filter(({ day }) => day !== own.day);
  if (others.length < 3) return null;
  const squares = others.flatMap(({ offsetMm }) => offsetMm.map((value) => value ** 2));
  const errors = others.map(({ standardErrorMm }) => standardErrorMm ** 2);
  const between = Math.max(0, median(squares) / MEDIAN_CHI_SQUARE - median(errors));
  const axes = own.offsetMm.length;
  const lengths = others.map(({ offsetMm }) => Math.hypot(...offsetMm));
  const size = Math.hypot(...own.offsetMm);
  const f = size ** 2 / axes / (own.standardErrorMm ** 2 + between);
  return {
    offsetMm: size,
    usualMm: median(lengths),
    pValue: f === 0 ? 1 : fCdf(1 / f, others.length, axes),
  };
}

/** Squares of the day's shots after the offset is taken out; what its estimation took away is given back. */
export function squaresWithout({ components }: FitData, own: SetupOffset): number[] {
  return own.rows.map((i) =>
    components.reduce((sum, e, c) => sum + (e[i]! - own.offsetMm[c]!) ** 2 + own.standardErrorMm ** 2, 0),
  );
}
