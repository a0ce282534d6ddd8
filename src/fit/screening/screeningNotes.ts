import { type Message, message, quotedList } from '../../logs/index.js';
import type { Screening } from './screenWrongFixes.js';

const percent = (share: number): string => `${Number((100 * share).toPrecision(2))} %`;
const counted = (n: number): string => `${n} ${n === 1 ? 'occupation' : 'occupations'}`;
/** Where the share stands when it would rise further. */
const SHARE_AT_ITS_LIMIT = 0.199;

/**
 * What must be said of a screening.
 * @param rows occupations that were screened
 * @param lone occupations on marks that were visited on one day only
 */
export function screeningNotes(found: Omit<Screening, 'notes'>, rows: number, lone: number): Message[] {
  const { suspected, crowdedDays, share, refused, converged, components } = found;
  const notes: Message[] = [];
  if (!converged) {
    notes.push(
      message(
        'warning',
        'screening-not-converged',
        'The search for wrong fixes did not converge: its weights are those of the last step. Look at the suspected occupations, and compare the fit without screening.',
      ),
    );
  }
  if (refused) {
    const many =
      share!.estimate > SHARE_AT_ITS_LIMIT
        ? 'That is too many gross errors to model.'
        : 'That is too many to be wrong fixes.';
    notes.push(
      message(
        'warning',
        'screening-refused',
        `${counted(suspected.length)} of ${rows} look like wrong fixes (share ${percent(share!.estimate)}). ${many} Check the coordinates of marks and base and the project settings first; nothing was screened.`,
      ),
    );
    return notes;
  }
  if (suspected.length > 0) {
    const { events } = share!;
    notes.push(
      message(
        'info',
        'suspected-wrong-fixes',
        `${counted(suspected.length)} of ${rows} in ${events} ${events === 1 ? 'event' : 'events'} ${suspected.length === 1 ? 'is a suspected wrong fix and counts' : 'are suspected wrong fixes and count'} little or nothing in the fit. Look at them, and compare the fit without screening.`,
      ),
    );
  }
  if (crowdedDays.length > 0) {
    notes.push(
      message(
        'warning',
        'suspects-on-one-day',
        `Three or more occupations of one day are suspected wrong fixes (${quotedList(crowdedDays)}): on a degraded day ordinary shots can look like them. Compare the fit with and without screening.`,
      ),
    );
  }
  if (components.length < 3) {
    notes.push(
      message(
        'info',
        'screened-on-fewer-components',
        `Wrong fixes were sought in ${components.join(' and ')} alone: about a third more of them stay unseen than with all three components. Give east, north and up where they are known.`,
      ),
    );
  }
  if (lone > 0) {
    notes.push(
      message(
        'info',
        'marks-of-one-day',
        `${counted(lone)} ${lone === 1 ? 'is' : 'are'} on marks visited on one day only, where a wrong fix cannot be told from an error of the mark. Visit marks on several days.`,
      ),
    );
  }
  return notes;
}

export const tooFewNote = (rows: number, needed: number): Message =>
  message(
    'info',
    'too-few-to-screen',
    `Expected at least ${needed} occupations to search for wrong fixes, came ${rows}. Nothing was screened; look at large errors yourself.`,
  );
