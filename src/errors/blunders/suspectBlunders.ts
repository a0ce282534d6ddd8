import type { Control } from '../../control/index.js';
import { type Message, message, quoted } from '../../logs/index.js';
import type { OccupationError, SetAsideOccupation } from '../computeErrors.js';
import { otherMark, witnessMarks } from './otherMarks.js';
import { markResiduals, type Residuals } from './residuals.js';
import { shiftedSetups } from './shiftedSetups.js';

/** What a blunder is taken for. */
export type BlunderCause = 'height-only' | 'other-mark' | 'witness-mark' | 'shifted-setup';

export interface Blunders {
  readonly errors: readonly OccupationError[];
  readonly setAside: readonly SetAsideOccupation[];
  readonly messages: readonly Message[];
}

/** Fewer occupations do not tell what is usual. */
const FEWEST = 20;
/** A height is a blunder of the rod from this size on, and so many times the usual, while the plan is as usual. */
const ROD_MM = 80;
const ROD_TIMES = 8;
const USUAL_TIMES = 3.5;

/**
 * Names occupations that a person got wrong, and tells them from wrong fixes: a height alone (rod step, antenna
 * reference), a vector that leads to another mark or twice to the same other place (wrong name, witness mark), a whole
 * setup shifted. They are set aside as suspected blunders with the cause; occupations more than 10 m off are looked at
 * too.
 */
export function suspectBlunders(
  errors: readonly OccupationError[],
  setAside: readonly SetAsideOccupation[],
  control: Control,
): Blunders {
  const found = new Map<OccupationError, { cause: BlunderCause; detail: string }>();
  const far = setAside.filter(({ reason }) => reason === 'error-over-10-m');
  for (const { error } of far) {
    const mark = otherMark(error, control, Number.NaN);
    if (mark !== null) found.set(error, otherMarkCause(mark));
  }
  if (errors.length >= FEWEST) nearBlunders(errors, control, found);
  const blunder = (error: OccupationError): SetAsideOccupation[] => {
    const cause = found.get(error);
    return cause === undefined ? [] : [{ reason: 'suspected-blunder', detail: cause.detail, error }];
  };
  return {
    errors: errors.filter((error) => !found.has(error)),
    setAside: [
      ...setAside.flatMap((one) => (found.has(one.error) ? blunder(one.error) : [one])),
      ...errors.flatMap(blunder),
    ],
    messages: blunderMessages([...found.entries()].map(([error, cause]) => ({ error, ...cause }))),
  };
}

function nearBlunders(
  errors: readonly OccupationError[],
  control: Control,
  found: Map<OccupationError, { cause: BlunderCause; detail: string }>,
): void {
  const residuals = markResiduals(errors);
  for (const { indices, words } of shiftedSetups(errors, residuals)) {
    for (const i of indices) {
      const detail = `the whole setup ${quoted(errors[i]!.setup)} is shifted by ${words}: centring, antenna height or coordinates of the base`;
      found.set(errors[i]!, { cause: 'shifted-setup', detail });
    }
  }
  errors.forEach((error, i) => {
    if (found.has(error)) return;
    const mark = otherMark(error, control, residuals.planScale[i]!);
    if (mark !== null) found.set(error, otherMarkCause(mark));
    else if (isHeightOnly(residuals, i)) {
      const up = residuals.up[i]!;
      const detail = `the height alone is off by ${up < 0 ? '−' : '+'}${Math.abs(up).toFixed(0)} mm: rod height or antenna reference`;
      found.set(error, { cause: 'height-only', detail });
    }
  });
  const left = errors.flatMap((error, i) => (found.has(error) ? [] : [i]));
  for (const { indices, words } of witnessMarks(errors, residuals, left)) {
    for (const i of indices) {
      const detail = `${indices.length} occupations of mark ${quoted(errors[i]!.mark)} stand at the same other place, ${words}: a witness mark or a wrong name`;
      found.set(errors[i]!, { cause: 'witness-mark', detail });
    }
  }
}

const otherMarkCause = (mark: string): { cause: BlunderCause; detail: string } => ({
  cause: 'other-mark',
  detail: `the position is that of mark ${quoted(mark)}: a wrong name`,
});

function isHeightOnly({ east, north, up, planScale, upScale }: Residuals, i: number): boolean {
  const size = Math.abs(up[i]!);
  if (!(size > ROD_MM && size > ROD_TIMES * upScale[i]!)) return false;
  // A mark known in height only cannot tell whether the plan was as usual.
  return Math.hypot(east[i]!, north[i]!) < USUAL_TIMES * Math.SQRT2 * planScale[i]!;
}

const CAUSE_WORDS: Readonly<Record<BlunderCause, string>> = {
  'height-only': 'the height alone is off: a rod height or an antenna reference',
  'other-mark': 'the position is that of another mark: a wrong name',
  'witness-mark': 'the same other place was measured more than once: a witness mark or a wrong name',
  'shifted-setup': 'the whole setup is shifted: centring, antenna height or coordinates of the base',
};

function blunderMessages(
  found: readonly { error: OccupationError; cause: BlunderCause; detail: string }[],
): Message[] {
  const causes = Object.keys(CAUSE_WORDS) as BlunderCause[];
  return causes.flatMap((cause) => {
    const own = found.filter((each) => each.cause === cause);
    const [first] = own;
    if (first === undefined) return [];
    const { file, row, mark, day } = first.error;
    const count = own.length === 1 ? '1 occupation looks' : `${own.length} occupations look`;
    const where = `${own.length === 1 ? '' : 'the first '}on mark ${quoted(mark)}, ${day}: ${first.detail}`;
    return [
      message(
        'warning',
        'suspected-blunder',
        `${count} like a blunder and ${own.length === 1 ? 'is' : 'are'} set aside (${CAUSE_WORDS[cause]}), ${where}. Look it up in the field book and correct the log or the names.`,
        { file, row },
      ),
    ];
  });
}
