import { tooAlike } from './constantAlone.js';
import { estimateForm, type FormEstimate } from './estimate.js';

import type { Form } from './forms.js';
import { type GroupCells, type LengthCells, lengthCells, withoutGroup } from './lengthCells.js';
import type { FitData } from './prepareErrors.js';

/** The fit of a form without one group; null where the rest cannot tell mm and ppm apart, or does not converge. */
export interface FitWithoutGroup {
  readonly group: GroupCells;
  readonly fitted: FormEstimate | null;
}

/** Fits a form with each day, or each mark, left out in turn, each started from the fit to all. */
export function fitWithoutEach(
  data: FitData,
  keys: readonly string[],
  form: Form,
): { readonly whole: FormEstimate | null; readonly cells: LengthCells; readonly fits: FitWithoutGroup[] } {
  const whole = tooAlike(data.l, data.w) ? null : estimateForm(data, form);
  const cells = lengthCells(data, keys);
  const fits = cells.groups.map((group): FitWithoutGroup => {
    const rest = withoutGroup(cells, group);
    if (rest.l.length === 0 || tooAlike(rest.l)) return { group, fitted: null };
    const fitted = estimateForm(rest, form, whole ?? undefined);
    return { group, fitted: fitted.converged ? fitted : null };
  });
  return { whole, cells, fits };
}
