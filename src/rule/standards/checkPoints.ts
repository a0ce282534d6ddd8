import { type ErrorsInput, errorColumns, groupIndices } from '../../errors/index.js';
import type { StandardCondition } from './condition.js';

/** Errors against the published coordinates with every mark as one check point. */
export interface CheckPoints {
  /** Marks known in plan, and in height. */
  readonly planPoints: number;
  readonly heightPoints: number;
  /** Root-mean-square errors, the bias in them, mm; NaN without points. */
  readonly rmseEastMm: number;
  readonly rmseNorthMm: number;
  readonly rmseUpMm: number;
  readonly rmseRadialMm: number;
  /** Smallest share of the plan points in a quarter of the horizon about the base; null where directions are not told. */
  readonly leastQuarterShare: number | null;
}

/**
 * Root-mean-square errors over check points: shots on one mark are no independent check points, so each mark counts once
 * with the mean square of its shots.
 * @param errors against the published coordinates, with `mark`, `east`, `north` and `up`
 * @throws InputError when a column is missing
 */
export function checkPoints(errors: ErrorsInput): CheckPoints {
  const columns = errorColumns(errors);
  const needed = 'check points';
  const marks = groupIndices(columns.texts('mark', needed));
  const meanSquares = (name: string): Map<string, number> => {
    const values = columns.numbers(name, needed);
    const found = new Map<string, number>();
    for (const [mark, rows] of marks) {
      const known = rows.filter((row) => !Number.isNaN(values[row]!));
      if (known.length > 0)
        found.set(mark, known.reduce((sum, row) => sum + values[row]! ** 2, 0) / known.length);
    }
    return found;
  };
  const [east, north, up] = [meanSquares('east'), meanSquares('north'), meanSquares('up')];
  const rmse = (squares: Map<string, number>): number =>
    Math.sqrt(
      [...squares.values()].sort((a, b) => a - b).reduce((sum, value) => sum + value, 0) / squares.size,
    );
  const [rmseEastMm, rmseNorthMm] = [rmse(east), rmse(north)];
  return {
    planPoints: east.size,
    heightPoints: up.size,
    rmseEastMm,
    rmseNorthMm,
    rmseUpMm: rmse(up),
    rmseRadialMm: Math.hypot(rmseEastMm, rmseNorthMm),
    leastQuarterShare: columns.has('azimuthDeg')
      ? quarterShare(
          [...east.keys()].map((mark) => columns.numbers('azimuthDeg', needed)[marks.get(mark)![0]!]!),
        )
      : null,
  };
}

function quarterShare(azimuths: readonly number[]): number | null {
  const known = azimuths.filter((azimuth) => !Number.isNaN(azimuth));
  if (known.length === 0) return null;
  const counts = [0, 0, 0, 0];
  for (const azimuth of known) counts[Math.floor((((azimuth % 360) + 360) % 360) / 90)]! += 1;
  return Math.min(...counts) / known.length;
}

/** Whether control is so much better than the errors that it may count as known. */
export function controlCondition(
  sigmaMm: number | undefined,
  rmseMm: number,
  times: number,
): StandardCondition {
  return {
    text: `check points are at least ${times} times as accurate as what is tested`,
    met: sigmaMm === undefined || Number.isNaN(rmseMm) ? null : times * sigmaMm <= rmseMm,
  };
}
