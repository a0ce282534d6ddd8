import { type Message, message } from '../../logs/index.js';
import type { Reference } from '../errorModel.js';
import type { FormEstimate } from '../estimate.js';
import { FORM_CURVES } from '../forms.js';
import type { FitData } from '../prepareErrors.js';
import { DAYS_OF_REPEATED_MARK } from './repeatedMarks.js';

/** Which marks a ppm rests on. */
export interface MarkSupport {
  /** Length at which both terms are equal, a/b, km; null without a ppm. */
  readonly evenKm: number | null;
  /** All marks, or those visited on three days or more. */
  readonly marks: readonly string[];
  /** Those of them beyond a/b. */
  readonly beyond: readonly string[];
}

export const FEWEST_MARKS = 3;
export const FEWEST_BEYOND = 2;

/** Marks behind a fit, of repeatability only those visited on three days or more; null without a mark column. */
export function markSupport(
  { mark, day, l, w }: FitData,
  fitted: FormEstimate,
  reference: Reference,
): MarkSupport | null {
  if (mark === null) return null;
  const { sigma } = FORM_CURVES[fitted.form];
  const evenKm = fitted.displayQ > 0 ? sigma(fitted.displayP) / sigma(fitted.displayQ) : null;
  const seen = new Map<string, { days: Set<string>; longest: number }>();
  mark.forEach((name, i) => {
    if (!(w[i]! > 0)) return;
    const own = seen.get(name) ?? { days: new Set(), longest: 0 };
    seen.set(name, own);
    own.days.add(day[i]!);
    own.longest = Math.max(own.longest, l[i]!);
  });
  const least = reference === 'repeatability' ? DAYS_OF_REPEATED_MARK : 1;
  const kept = [...seen].filter(([, { days }]) => days.size >= least).sort(([a], [b]) => (a < b ? -1 : 1));
  return {
    evenKm,
    marks: kept.map(([name]) => name),
    beyond:
      evenKm === null ? [] : kept.filter(([, { longest }]) => longest > evenKm ** 2).map(([name]) => name),
  };
}

/** Says when a ppm may be the doing of one or two places. */
export function markSupportNote(support: MarkSupport | null, reference: Reference): Message[] {
  if (support === null || support.evenKm === null) return [];
  const { marks, beyond, evenKm } = support;
  if (marks.length >= FEWEST_MARKS && beyond.length >= FEWEST_BEYOND) return [];
  const visited = reference === 'repeatability' ? ' visited on 3 days or more' : '';
  const reason =
    marks.length < FEWEST_MARKS
      ? `there ${marks.length === 1 ? 'is only 1 mark' : `are only ${marks.length} marks`}${visited}`
      : beyond.length === 0
        ? `no mark${visited} lies beyond ${evenKm.toFixed(1)} km, where the ppm begins to outweigh the constant`
        : `the ppm rests on mark ${beyond[0]} alone, the only one${visited} beyond ${evenKm.toFixed(1)} km, where the ppm begins to outweigh the constant`;
  return [
    message(
      'warning',
      'distance-or-mark',
      `Distance and mark cannot be told apart: ${reason}. Visit more far marks, in several directions.`,
    ),
  ];
}
