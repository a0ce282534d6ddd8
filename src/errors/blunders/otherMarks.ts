import { type Control, coordinatesOn } from '../../control/index.js';
import { geodeticToGeocentric, localFrame } from '../../geodesy/index.js';
import type { OccupationError } from '../computeErrors.js';
import { groupIndices } from '../groupIndices.js';
import type { Residuals } from './residuals.js';

/** A vector this small leads nowhere else. */
const ELSEWHERE_MM = 100;
/** … and it must be so many times the usual error. */
const TIMES_USUAL = 8;
/** Another mark is met within this, or within so many usual errors. */
const MET_MM = 50;
const MET_TIMES = 4;

/**
 * The other mark at which an occupation really stands, in plan; null when there is none.
 * @param planScale usual error of one axis at this distance, mm; NaN when it is not known
 */
export function otherMark(error: OccupationError, control: Control, planScale: number): string | null {
  const { east, north, mark, day } = error;
  const size = Math.hypot(east, north);
  if (!(size > ELSEWHERE_MM) || size < TIMES_USUAL * planScale) return null;
  const own = coordinatesOn(control.marks.get(mark)!, day)!.position;
  const within = Math.max(MET_MM, MET_TIMES * (planScale || 0));
  for (const [name, other] of control.marks) {
    const position = name === mark ? null : (coordinatesOn(other, day)?.position ?? null);
    if (position === null || Number.isNaN(position.latitudeDeg)) continue;
    // The normals of two marks are not parallel: 20 km away 100 m of height move a place by 0.3 m in plan.
    const known = !Number.isNaN(own.heightM) && !Number.isNaN(position.heightM);
    const [from, to] = known ? [own, position] : [own, position].map((place) => ({ ...place, heightM: 0 }));
    const { eastM, northM } = localFrame(from!).toLocal(geodeticToGeocentric(to!));
    if (Math.hypot(east - 1000 * eastM, north - 1000 * northM) < within) return name;
  }
  return null;
}

/** Occupations of one mark that stand together at another place, on more than one day. */
export function witnessMarks(
  errors: readonly OccupationError[],
  { east, north, planScale }: Residuals,
  candidates: readonly number[],
): { indices: readonly number[]; words: string }[] {
  const away = candidates.filter((i) => {
    const size = Math.hypot(east[i]!, north[i]!);
    return size > ELSEWHERE_MM && size > TIMES_USUAL * planScale[i]!;
  });
  const byMark = groupIndices(away.map((i) => errors[i]!.mark));
  return [...byMark.values()].flatMap((list) => {
    const indices = list.map((k) => away[k]!);
    const [first] = indices as [number];
    const together = indices.filter(
      (i) =>
        Math.hypot(east[i]! - east[first]!, north[i]! - north[first]!) <
        Math.max(MET_MM, MET_TIMES * planScale[i]!),
    );
    if (new Set(together.map((i) => errors[i]!.day)).size < 2) return [];
    const metres = Math.hypot(east[first]!, north[first]!) / 1000;
    return [{ indices: together, words: `${metres.toFixed(2)} m away` }];
  });
}
