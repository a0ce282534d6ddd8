import { type Message, message } from '../../logs/index.js';
import type { SetupSeparation } from './relative.js';
import type { Repeatability } from './repeatability.js';

const occupations = (count: number): string => `${count} ${count === 1 ? 'occupation' : 'occupations'}`;

/** What was set aside to count errors from the marks' means. */
export function repeatabilityNotes({ setAside }: Repeatability): Message[] {
  if (setAside === 0) return [];
  return [
    message(
      'info',
      'marks-on-one-day',
      `${occupations(setAside)} on marks that were visited on a single day ${setAside === 1 ? 'is' : 'are'} set aside: a single day says nothing of how well a position is found again. Visit these marks on another day too.`,
    ),
  ];
}

/** A setup with so few visits is separated, and told. */
const FEW_VISITS = 4;

/** What was set aside to take out the setups' offsets, and what makes them doubtful. */
export function relativeNotes(separation: SetupSeparation): Message[] {
  const { setups, setAside, onLoneMarks, marksTakenOut, converged } = separation;
  const notes: Message[] = [];
  if (setAside > 0) {
    const not = setups.filter(({ separable }) => !separable);
    const example = not[0]!;
    notes.push(
      message(
        'warning',
        'setups-not-separable',
        `${occupations(setAside)} in ${not.length} of ${setups.length} setups ${setAside === 1 ? 'is' : 'are'} set aside, because an error of the base cannot be told from errors of the marks there: of setup ${example.setup}, ${example.reason}. Visit at least 3 marks on several sides of the base in each setup.`,
      ),
    );
  }
  const few = setups.filter(({ separable, visits }) => separable && visits <= FEW_VISITS);
  if (few.length > 0) {
    notes.push(
      message(
        'warning',
        'setups-with-few-visits',
        `${few.length} of ${setups.length} setups ${few.length === 1 ? 'has' : 'have'} only 3 or 4 visits: their offsets take part of the errors with them, and the ppm comes out low, by about a tenth at 3 visits. Make 5 visits or more in each setup.`,
      ),
    );
  }
  if (onLoneMarks > 0) {
    notes.push(
      message(
        'info',
        'marks-on-one-day',
        `${occupations(onLoneMarks)} on marks that were visited on a single day ${onLoneMarks === 1 ? 'is' : 'are'} set aside, because the marks' own errors are taken out too. Visit these marks on another day too.`,
      ),
    );
  }
  if (marksTakenOut) {
    notes.push(
      message(
        'info',
        'marks-taken-out',
        "The marks' own errors are taken out with the setups' offsets, because most occupations lie on marks that were visited again. What remains is neither an error of the base nor of the marks.",
      ),
    );
  }
  if (!converged) {
    notes.push(
      message(
        'warning',
        'not-converged',
        'Offsets of the setups and the errors growing with distance could not be told apart: the steps did not end. Take the numbers as a hint only, and visit more marks in each setup.',
      ),
    );
  }
  return notes;
}
