import type { FitComponent } from '../forms.js';
import type { FitData } from '../prepareErrors.js';
import { markErrors, marksInUse } from './markComponent.js';
import { markSpread } from './markVariance.js';
import { repeatability } from './repeatability.js';
import { varianceModel } from './varianceModel.js';

const FEWEST_MARKS = 3;

/**
 * How much the marks' own errors differ from each other, standard deviation per axis, mm. An offset common to all marks
 * is not in it.
 * @returns null with fewer than 3 marks on 3 days or more
 */
export function spreadOfMarks(data: FitData, component: FitComponent): number | null {
  const { mark, day } = data;
  if (mark === null) return null;
  const days = new Map<string, Set<string>>();
  mark.forEach((name, i) => {
    days.set(name, (days.get(name) ?? new Set()).add(day[i]!));
  });
  if ([...days.values()].filter((set) => set.size >= 3).length < FEWEST_MARKS) return null;
  const { data: residuals, rho, markDays } = repeatability(data, mark, { base: null, azimuthDeg: null });
  const used = marksInUse(markErrors(markDays, rho, varianceModel(residuals), component));
  return used.length < FEWEST_MARKS ? null : Math.sqrt(markSpread(used));
}
