import { type ErrorsInput, errorColumns, groupIndices } from '../../errors/index.js';
import { type Message, message } from '../../logs/index.js';
import type { ErrorModel } from '../errorModel.js';
import { axesOf, type FitComponent, FORM_CURVES } from '../forms.js';
import { badOption } from '../options.js';
import { referenceData } from '../reference/referenceData.js';

export type InformationBy = 'mark' | 'day' | 'direction' | 'crew';

/** How much of what is known of the ppm comes from one mark, day, direction or crew. */
export interface InformationShare {
  readonly group: string;
  readonly occupations: number;
  /** 0 to 1; all shares add up to 1. */
  readonly share: number;
}

export interface InformationShares {
  readonly by: InformationBy;
  /** Largest first. */
  readonly shares: readonly InformationShare[];
  readonly notes: readonly Message[];
}

const NEEDED = { mark: 'mark', day: 'day', direction: 'azimuthDeg', crew: 'crew' } as const;
const SECTORS = ['north', 'north-east', 'east', 'south-east', 'south', 'south-west', 'west', 'north-west'];
const LARGE = 0.5;
/** … and so many times an even share: of two crews each has half. */
const TIMES_EVEN = 1.5;

/**
 * Shares of the information on the ppm, Σ w (x - x̄)² σ²'²/μ² of the group over that of all (x is L², or L in the
 * linear-sum form). A group that carries more than half is named in a note.
 * @param model fitted to the same errors
 * @param weights those of the fit
 * @throws InputError when a column is missing
 */
export function informationShares(
  errors: ErrorsInput,
  model: ErrorModel<FitComponent>,
  by: InformationBy,
  { weights }: { readonly weights?: Float64Array | undefined } = {},
): InformationShares {
  if (!Object.hasOwn(NEEDED, by)) throw badOption('by', '"mark", "day", "direction" or "crew"', by);
  const columns = errorColumns(errors);
  const names = groupNames(by, columns);
  // A composed absolute model has the ppm of repeatability.
  const reference = model.markComponent === null ? model.reference : 'repeatability';
  const { data } = referenceData(errors, { component: model.component, reference, weights });
  const information = informationOf(data, model);
  const total = information.reduce((sum, value) => sum + value, 0);
  const groups = [...groupIndices(Array.from(data.rows, (row) => names[row]!))].sort(([a], [b]) =>
    a < b ? -1 : 1,
  );
  const shares = groups
    .map(
      ([group, members]): InformationShare => ({
        group,
        occupations: members.length,
        share: total > 0 ? members.reduce((sum, i) => sum + information[i]!, 0) / total : 0,
      }),
    )
    .sort((a, b) => b.share - a.share);
  return { by, shares, notes: shareNote(by, shares) };
}

function groupNames(by: InformationBy, columns: ReturnType<typeof errorColumns>): string[] {
  const neededFor = `informationShares by "${by}"`;
  if (by !== 'direction') return columns.texts(NEEDED[by], neededFor);
  return Array.from(columns.numbers('azimuthDeg', neededFor), (azimuth) =>
    Number.isNaN(azimuth) ? 'unknown' : SECTORS[Math.round((((azimuth % 360) + 360) % 360) / 45) % 8]!,
  );
}

function informationOf(
  { l, w }: { readonly l: Float64Array; readonly w: Float64Array },
  { form, fitted, markComponent, component }: ErrorModel<FitComponent>,
): Float64Array {
  const curve = FORM_CURVES[form];
  const own = markComponent === null ? 0 : axesOf(component) * (markComponent.sigmaMm.estimate ?? 0) ** 2;
  const p = fitted.displayP - own;
  const x = l.map(curve.regressor);
  const v = x.map((value, i) => {
    const eta = p + fitted.displayQ * value;
    return w[i]! * (curve.slope(eta) / curve.variance(eta)) ** 2;
  });
  let [s0, s1] = [0, 0];
  v.forEach((value, i) => {
    s0 += value;
    s1 += value * x[i]!;
  });
  return v.map((value, i) => value * (x[i]! - s1 / s0) ** 2);
}

const MORE: Readonly<Record<InformationBy, string>> = {
  mark: 'at other marks',
  day: 'on other days',
  direction: 'on other sides of the base',
  crew: 'with other crews',
};

function shareNote(by: InformationBy, shares: readonly InformationShare[]): Message[] {
  const [largest] = shares;
  if (largest === undefined || shares.length < 2) return [];
  if (largest.share <= Math.max(LARGE, TIMES_EVEN / shares.length)) return [];
  return [
    message(
      'warning',
      'ppm-rests-on-few',
      `${by[0]!.toUpperCase()}${by.slice(1)} ${largest.group} alone carries ${Math.round(100 * largest.share)} % of what is known of the ppm. Take far shots ${MORE[by]} too.`,
    ),
  ];
}
