import { readHead } from '../byteChunks.js';
import type { DelimitedLayout, LogLayout } from '../layout.js';
import { InputError, type Message, message, quoted } from '../messages.js';
import type { Doubt, RecognizedLog, RecognizeOptions } from './recognition.js';
import { recognizeLayout } from './recognizeLayout.js';

/** The layout of a log that the study file gives none for, and what is told about it. */
export interface AutoLayout {
  readonly layout: LogLayout;
  readonly messages: readonly Message[];
}

const DEFAULT: DelimitedLayout = { kind: 'delimited' };

/**
 * Doubts that the reader of rows has itself: it sets the rows aside and says what to state. A file that needs no layout
 * otherwise is left to it.
 */
const TOLD_BY_READER: ReadonlySet<string> = new Set([
  'time-zone',
  'time-format',
  'fix-values',
  'missing-column',
  'repeated-role',
  'no-date',
  'unreadable-rows',
]);

/**
 * Recognises the layout of a log by its first bytes. A file that spells everything itself gives `{kind: 'delimited'}` and
 * no message; a layout that was concluded comes with one message that says what was understood.
 * @param file name in messages
 * A file that is no log is left to the reader, which accounts for every line of it.
 * @throws InputError with each question that must be answered first
 */
export async function autoLayout(
  path: string,
  file: string,
  options: RecognizeOptions = {},
): Promise<AutoLayout> {
  const recognition = recognizeLayout(await readHead(path), file, options);
  if (recognition.kind === 'unrecognized') return unrecognizedLayout(recognition.message);
  const { coordinates, unsure } = recognition;
  const isOwn = coordinates === null || coordinates === (options.coordinates ?? 'geographic');
  const layout: LogLayout =
    isOwn || recognition.layout.kind === 'nmea' ? recognition.layout : { ...recognition.layout, coordinates };
  const isPlain = layout.kind === 'delimited' && Object.keys(layout).length === 1;
  const decisive = unsure.filter((doubt) => doubt.decisive && !(isPlain && TOLD_BY_READER.has(doubt.code)));
  if (decisive.length > 0) throw new InputError(decisive.map((doubt) => doubtMessage(doubt, file)));
  return { layout, messages: isPlain ? [] : [recognizedMessage({ ...recognition, layout })] };
}

/** What the reader of rows does not say itself: how to export a spreadsheet, and that sentences are damaged. */
function unrecognizedLayout(told: Message): AutoLayout {
  if (told.code === 'damaged-nmea') return { layout: { kind: 'nmea' }, messages: [told] };
  return { layout: DEFAULT, messages: told.code === 'spreadsheet' ? [told] : [] };
}

function doubtMessage({ code, question, because, key, choices }: Doubt, file: string): Message {
  const choice = choices.length === 0 ? '' : ` as ${choices.join(' or ')}`;
  return message(
    'error',
    code,
    `${question} ${because} State ${quoted(key)} in the study file${choice}; "ppmwise layout" prints a layout of this file to begin with.`,
    { file },
  );
}

function recognizedMessage({ layout, file, unsure }: RecognizedLog): Message {
  const understood = layout.kind === 'nmea' ? 'NMEA 0183 sentences' : delimitedWords(layout);
  const fromName = layout.fromFileName === undefined ? '' : ', the date in the name of the file';
  const checks =
    unsure.length > 0 ? 'run "ppmwise layout" with this file to check it' : 'state a layout if that is wrong';
  return message(
    'info',
    'layout-recognized',
    `The layout of this log was recognised as ${understood}${fromName}; ${checks}.`,
    { file },
  );
}

function delimitedWords(layout: DelimitedLayout): string {
  const { delimiter, decimal, header, skipLines, comment, encoding, columns, units, coordinates, time } =
    layout;
  const named = Object.entries(columns ?? {}).map(
    ([role, column]) => `${role} in ${typeof column === 'number' ? `column ${column}` : quoted(column)}`,
  );
  const unit = typeof units === 'string' ? [units] : Object.values(units ?? {});
  const parts = [
    `cells between ${delimiter === undefined ? 'the delimiters of its header' : delimiter}`,
    ...(decimal === undefined ? [] : ['decimal commas']),
    ...(skipLines === undefined ? [] : [`${skipLines} ${skipLines === 1 ? 'line' : 'lines'} passed over`]),
    ...(comment === undefined ? [] : [`comments after ${quoted(comment)}`]),
    ...(encoding === undefined ? [] : [`letters in ${encoding}`]),
    ...(header === false ? ['no header'] : []),
    ...named,
    ...(coordinates === undefined ? [] : [`coordinates ${coordinates}`]),
    ...(unit.length === 0 ? [] : [`units ${unit.join(' and ')}`]),
    ...(time === undefined ? [] : [`times ${Object.values(time).map(quoted).join(' ')}`]),
  ];
  return parts.join(', ');
}
