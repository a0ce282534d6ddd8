import type { OccupationError, SetAsideOccupation } from '../errors/index.js';
import { type Screening, screenWrongFixes, type WrongFixGrowth, wrongFixGrowth } from '../fit/index.js';
import type { Message } from '../logs/index.js';
import type { WrongFixResult } from './fitResultTypes.js';
import type { Results } from './results.js';
import type { Study } from './study.js';

/** What a run knows of wrong fixes. */
export interface WrongFixes {
  readonly screening: Screening;
  /** Null where nothing was screened. */
  readonly growth: WrongFixGrowth | null;
  /** What each error counts in a fit; null when the screening was refused. */
  readonly weights: Float64Array | null;
  readonly messages: readonly Message[];
}

/** Looks for wrong fixes among the errors; null when the study asks for none, or there are no errors. */
export function screenStudy(
  errors: readonly OccupationError[],
  { screen, confidence }: Pick<Study, 'screen' | 'confidence'>,
): WrongFixes | null {
  if (!screen || errors.length === 0) return null;
  const screening = screenWrongFixes(errors, { confidence });
  const usable = screening.share !== null && !screening.refused;
  const growth = usable ? wrongFixGrowth(errors, screening) : null;
  return {
    screening,
    growth,
    weights: usable ? screening.weights : null,
    messages: [...screening.notes, ...(growth?.notes ?? [])],
  };
}

/** The suspected ones as occupations that are set aside, with how probable it is. */
export function suspects(
  errors: readonly OccupationError[],
  wrongFixes: WrongFixes | null,
): SetAsideOccupation[] {
  return wrongFixes?.weights == null ? [] : suspectsOf(errors, wrongFixes.screening);
}

export function suspectsOf(
  errors: readonly OccupationError[],
  { suspected, responsibilities }: Pick<Screening, 'suspected' | 'responsibilities'>,
): SetAsideOccupation[] {
  return suspected.map((i) => ({
    reason: 'suspected-wrong-fix',
    detail: `probability ${responsibilities[i]!.toFixed(3)}`,
    error: errors[i]!,
  }));
}

/** Every suspected occupation, for review in the field book. */
export function wrongFixResults(
  errors: readonly OccupationError[],
  wrongFixes: WrongFixes | null,
): readonly WrongFixResult[] {
  if (wrongFixes === null) return [];
  const { suspected, responsibilities } = wrongFixes.screening;
  return suspected.map((i) => {
    const { day, mark, rover, crew, baselineKm, east, north, up, file, row } = errors[i]!;
    const known = (value: number): number | null => (Number.isNaN(value) ? null : value);
    return {
      day,
      mark,
      rover,
      crew,
      baselineKm,
      east: known(east),
      north: known(north),
      up: known(up),
      probability: responsibilities[i]!,
      file,
      row,
    };
  });
}

/** The account of occupations with the suspected ones taken from the used ones. */
export function withSuspects(
  { formed, used, setAside }: Results['occupations'],
  count: number,
): Results['occupations'] {
  if (count === 0) return { formed, used, setAside };
  return { formed, used: used - count, setAside: { ...setAside, 'suspected-wrong-fix': count } };
}
