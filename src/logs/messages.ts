/**
 * Messages to the user. Grammar, held by a test: `text` is one or more full sentences; it says what was
 * expected, what came and what to do; place (file, row, column) stands in its own fields, not in the text.
 */

import { quoted } from '../time/index.js';

export { quoted };

export type Severity = 'error' | 'warning' | 'info';

export interface Message {
  /** Stable name of the kind of message, lower case with hyphens. */
  readonly code: string;
  readonly severity: Severity;
  readonly text: string;
  readonly file: string | null;
  /** Line of the file, from 1, the header included. */
  readonly row: number | null;
  /** Header of a column, or path of a key in a study file. */
  readonly column: string | null;
}

export interface Place {
  readonly file?: string;
  readonly row?: number;
  readonly column?: string;
}

export function message(severity: Severity, code: string, text: string, place: Place = {}): Message {
  return {
    code,
    severity,
    text,
    file: place.file ?? null,
    row: place.row ?? null,
    column: place.column ?? null,
  };
}

/** One line: `logs/a.csv:17 [latitude] error: …`, without control characters that a terminal would obey. */
export function formatMessage(m: Message): string {
  const where = `${m.file ?? ''}${m.row === null ? '' : `:${m.row}`}${m.column === null ? '' : ` [${m.column}]`}`;
  const line = `${where === '' ? '' : `${where.trim()} `}${m.severity}: ${m.text}`;
  return line.replace(/\p{Cc}/gu, '\ufffd');
}

const MOST_LISTED = 20;

/** Texts as they came, in quotes; of a long list the first ones and how many more there are. */
export function quotedList(texts: readonly string[]): string {
  const more = texts.length - MOST_LISTED;
  return `${texts.slice(0, MOST_LISTED).map(quoted).join(', ')}${more > 0 ? ` and ${more} more` : ''}`;
}

/** Thrown for a user's mistake that stops the work: it carries messages and never shows a stack trace. */
export class InputError extends Error {
  constructor(readonly messages: readonly Message[]) {
    super(messages.map(formatMessage).join('\n'));
    this.name = 'InputError';
  }
}

/** The error for a single mistake. */
export function inputError(code: string, text: string, place: Place = {}): InputError {
  return new InputError([message('error', code, text, place)]);
}
