import { compileTimeFormat, type TimeGuess } from '../../time/index.js';
import { quoted, quotedList } from '../messages.js';
import type { Draft } from './draft.js';

const SHOWN_TEXTS = 3;

const orderOf = (format: string): string =>
  format
    .replaceAll(/'[^']*'(?!yy)/g, '')
    .replaceAll(/'\d\d'/g, '')
    .replaceAll(/[^yMdD]/g, '')
    .replaceAll(/(.)\1+/g, '$1');

/**
 * The format of the times when the texts decide it, else null and a question.
 * @param guesses formats with a date that read the texts, best first
 */
export function askAboutFormat(
  draft: Draft,
  texts: readonly string[],
  guesses: readonly TimeGuess[],
): string | null {
  const [best] = guesses;
  const examples = quotedList([...new Set(texts)].slice(0, SHOWN_TEXTS));
  if (best === undefined) {
    ask(draft, 'time-format', 'How are the times written?', `No usual format reads ${examples}.`, []);
    return null;
  }
  const formats = guesses.map(({ format }) => format);
  if (new Set(formats.map(orderOf)).size > 1) {
    const because = `In the first rows texts such as ${examples} are read by each of ${quotedList(formats)}.`;
    ask(draft, 'date-order', 'In which order are day, month and year written?', because, formats);
    return null;
  }
  const isShortYear = formats.some((format) => format.includes("'yy"));
  if (isShortYear) {
    const because = `The year in texts such as ${examples} has two digits.`;
    ask(draft, 'two-digit-year', 'Which years are meant?', because, formats);
    return null;
  }
  if (guesses.length > 1) {
    const because = `Texts such as ${examples} are read by each of ${quotedList(formats)}.`;
    ask(draft, 'time-format', 'How are the times written?', because, formats);
    return null;
  }
  tellClock(draft, texts, best);
  return best.format;
}

function ask(
  draft: Draft,
  code: string,
  question: string,
  because: string,
  choices: readonly string[],
): void {
  draft.doubt({ code, question, because, key: 'layout.time.format', choices, decisive: true });
}

/** What a format that is decided leaves open. */
function tellClock(draft: Draft, texts: readonly string[], guess: TimeGuess): void {
  if (guess.ambiguous.some((note) => note.includes('24-hour'))) {
    const fall = firstFall(texts, guess.format);
    draft.doubt({
      code: 'half-day',
      question: 'Are the times written by the 24-hour clock?',
      because: `No hour is 0 or past 12 and none has AM or PM${fall === null ? '' : `, and the times fall back at ${quoted(fall)}`}.`,
      key: 'layout.time.format',
      choices: [guess.format],
      decisive: fall !== null,
    });
  }
  if (guess.format === 'excel') {
    draft.doubt({
      code: 'serial-days',
      question: 'Do the serial numbers of days count from 1900?',
      because: `Numbers such as ${quoted(texts[0]!)} are rarely counted from 1904: then they are read four years early.`,
      key: 'layout.time.format',
      choices: ['excel'],
      decisive: false,
    });
  }
}

const HOUR_MS = 3_600_000;
const DAY_MS = 24 * HOUR_MS;

/** The first time that falls by half a day or nearly so within one date: 12:50 before 1:10 is no 24-hour clock. */
function firstFall(texts: readonly string[], format: string): string | null {
  const read = compileTimeFormat(format);
  let before = Number.NaN;
  for (const text of texts) {
    const now = read(text)?.wallMs ?? Number.NaN;
    const sameDay = Math.floor(now / DAY_MS) === Math.floor(before / DAY_MS);
    if (sameDay && before - now > 9 * HOUR_MS) return text;
    before = now;
  }
  return null;
}

export function askForZone(draft: Draft, guess: TimeGuess): void {
  draft.doubt({
    code: 'time-zone',
    question: 'In which zone are the times written?',
    because: `${guess.ambiguous.some((note) => note.startsWith('some')) ? 'Some' : 'The'} times have no offset, and the study states no timeZone.`,
    key: 'layout.time.zone',
    choices: [],
    decisive: true,
  });
}

export function askForDate(draft: Draft): void {
  draft.doubt({
    code: 'no-date',
    question: 'On which day were the rows measured?',
    because: `Neither the rows nor the name of the file have a date${draft.has('timeOfDay') ? ', only a time of day' : ''}.`,
    key: 'layout.constants.date',
    choices: [],
    decisive: true,
  });
}
