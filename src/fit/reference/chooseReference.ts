import { type ErrorsInput, errorColumns } from '../../errors/index.js';
import { type Message, message } from '../../logs/index.js';
import type { Reference } from '../errorModel.js';
import type { FitComponent } from '../forms.js';
import { pickEntries, prepareErrors } from '../prepareErrors.js';
import { FEWEST_BEYOND, FEWEST_MARKS, type MarkSupport, markSupport } from './markSupport.js';
import { repeatability } from './repeatability.js';
import { SHARE_ON_REPEATED_MARKS, shareOnRepeatedMarks } from './repeatedMarks.js';
import { varianceModel } from './varianceModel.js';

/** The reference on which ppm and rule are to rest, and why. */
export interface ReferenceChoice {
  readonly reference: Extract<Reference, 'absolute' | 'repeatability'>;
  /** Share of the occupations on marks visited on three days or more. */
  readonly shareOnRepeatedMarks: number;
  /** Marks visited on three days or more, and those of them beyond a/b; null where marks do not repeat. */
  readonly support: MarkSupport | null;
  /** The choice and its reason. */
  readonly message: Message;
}

/**
 * Repeatability where at least half of the occupations lie on marks visited on three days or more and there are three
 * such marks; else the published coordinates. Without two of them beyond a/b the ppm rests on little, which is told, but
 * against the published coordinates the marks' own errors would be in it too.
 * @throws InputError as referenceData for `absolute`
 */
export function chooseReference(
  errors: ErrorsInput,
  { component, weights }: { readonly component: FitComponent; readonly weights?: Float64Array | undefined },
): ReferenceChoice {
  const data = prepareErrors(errors, component, weights);
  const columns = errorColumns(errors);
  const bases = columns.has('base') ? columns.texts('base', 'a note') : null;
  const base = bases && Array.from(data.rows, (row) => bases[row]!);
  const { mark } = data;
  const share = mark === null ? 0 : shareOnRepeatedMarks(data, { mark, base });
  const absolute = (reason: string, support: MarkSupport | null): ReferenceChoice => ({
    reference: 'absolute',
    shareOnRepeatedMarks: share,
    support,
    message: message(
      share > 0 ? 'warning' : 'info',
      'reference-absolute',
      `Errors are counted from the published coordinates, because ${reason}. Errors of the marks are then part of constant and ppm: visit at least ${FEWEST_MARKS} marks, ${FEWEST_BEYOND} of them far, on 3 days or more each.`,
    ),
  });
  if (mark === null) return absolute('the errors do not say on which mark they were measured', null);
  if (share === 0) return absolute('no mark was visited on 3 days or more', null);
  if (share < SHARE_ON_REPEATED_MARKS) {
    return absolute(
      `only ${percent(share)} of the occupations lie on marks that were visited on 3 days or more`,
      null,
    );
  }
  const kept = Array.from(data.w.keys()).filter((i) => data.w[i]! > 0);
  const part = pickEntries(data, kept);
  const found = repeatability(part, part.mark!, {
    base: base && kept.map((i) => base[i]!),
    azimuthDeg: null,
  });
  const support = markSupport(found.data, varianceModel(found.data), 'repeatability')!;
  if (support.marks.length < FEWEST_MARKS) {
    return absolute(`only ${support.marks.length} marks were visited on 3 days or more`, support);
  }
  const text = `Errors are counted from each mark's mean of its other days, because ${percent(share)} of the occupations lie on ${support.marks.length} marks that were visited on 3 days or more: this is how well a position is found again on another day. What is the same every day (coordinates of marks and base, scale, geoid, transformation) is not in it.`;
  const chosen = { reference: 'repeatability', shareOnRepeatedMarks: share, support } as const;
  if (support.beyond.length >= FEWEST_BEYOND) {
    return { ...chosen, message: message('info', 'reference-repeatability', text) };
  }
  const far = support.beyond.length === 0 ? 'no mark' : `only mark ${support.beyond[0]}`;
  return {
    ...chosen,
    message: message(
      'warning',
      'reference-repeatability',
      `${text} Of these marks ${far} is far enough from the base for the ppm to outweigh the constant: visit ${FEWEST_BEYOND} far marks on 3 days or more each.`,
    ),
  };
}

const percent = (share: number): string => `${Math.floor(100 * share)} %`;
