import { groupIndices } from '../errors/index.js';
import type { FitData } from '../fit/index.js';
import { type DayEvidence, type Shots, STRONG, SUBSTANTIAL } from './dayEvidence.js';

/** A part of a day's shots that alone makes the day look degraded. */
export interface GuiltyPart {
  readonly name: string;
  readonly occupations: number;
  /** How strongly the part itself says degraded, and the rest of the day ordinary. */
  readonly evidence: number;
  readonly restEvidence: number;
}

/**
 * The part of a day (a mark, a crew, a receiver) without which the day is ordinary: it must say degraded strongly, more
 * so the more parts there are to choose from, and the rest must say ordinary.
 * @param rows of the day
 * @param names of every row of data
 */
export function guiltyPart(
  data: FitData,
  rows: readonly number[],
  names: readonly string[],
  evidence: DayEvidence,
): GuiltyPart | null {
  const parts = groupIndices(rows.map((i) => names[i]!));
  if (parts.size < 2) return null;
  const found = [...parts].flatMap(([name, places]): GuiltyPart[] => {
    const inside = new Set(places);
    const own = evidence.ordinaryOverDegraded(
      pickShots(
        data,
        places.map((k) => rows[k]!),
      ),
    );
    const rest = evidence.ordinaryOverDegraded(
      pickShots(
        data,
        rows.filter((_, k) => !inside.has(k)),
      ),
    );
    if (1 / own < STRONG * parts.size || rest < SUBSTANTIAL) return [];
    return [{ name, occupations: places.length, evidence: 1 / own, restEvidence: rest }];
  });
  return found.sort((a, b) => b.restEvidence - a.restEvidence)[0] ?? null;
}

export const pickShots = ({ y, l, w }: FitData, rows: readonly number[]): Shots => ({
  y: rows.map((i) => y[i]!),
  l: rows.map((i) => l[i]!),
  w: rows.map((i) => w[i]!),
});

/**
 * Evidence that errors grow with distance whichever mark is left out: one wrong mark far out looks the same.
 * @param rows of the day
 */
export function growthEvidence(data: FitData, rows: readonly number[], evidence: DayEvidence): number {
  const whole = evidence.growthOverLevel(pickShots(data, rows));
  if (data.mark === null) return whole;
  const marks = new Set(rows.map((i) => data.mark![i]!));
  const without = [...marks].map((mark) =>
    evidence.growthOverLevel(
      pickShots(
        data,
        rows.filter((i) => data.mark![i] !== mark),
      ),
    ),
  );
  return Math.min(whole, ...without);
}
