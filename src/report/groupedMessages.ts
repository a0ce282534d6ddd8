import type { Message } from '../logs/index.js';
import { count } from './format.js';

/** Findings that spoil every number: they are told first, and beside the rule. */
const SPOILING: ReadonlySet<string> = new Set([
  'swapped-axes',
  'plan-unit',
  'height-unit',
  'wrong-zone',
  'height-kind',
  'base-coordinate',
  'frame-or-base',
  'rod-height',
  'grid-for-ground',
  'systematic-scale',
  'rotated',
  'tilted',
  'mark-far-off',
  'marks-far-off',
  'error-over-10-m',
  'systematic-offset',
  'not-converged',
]);

export const spoiling = (messages: readonly Message[]): Message[] =>
  messages.filter(({ code }) => SPOILING.has(code));

/** A message with the files in which the same was found. */
export interface GroupedMessage extends Message {
  /** Other files of which the same is told but for numbers. */
  readonly otherFiles: number;
}

const SEVERITIES: Readonly<Record<Message['severity'], number>> = { error: 0, warning: 1, info: 2 };

/** Messages with the most severe first, among them what spoils every number; the same of many files is told once. */
export function groupedMessages(messages: readonly Message[]): GroupedMessage[] {
  const groups = new Map<string, { first: Message; files: Set<string> }>();
  for (const told of messages) {
    // Only other files can say the same again; what a file says twice is two things.
    const file = told.file ?? '';
    const alike = `${told.code} ${told.column} ${told.text.replace(/\d+/g, '#')}`;
    const key = file === '' || groups.get(alike)?.files.has(file) ? `${groups.size}` : alike;
    const group = groups.get(key);
    if (group === undefined) groups.set(key, { first: told, files: new Set([file]) });
    else group.files.add(file);
  }
  const rank = ({ severity, code }: Message): number =>
    2 * SEVERITIES[severity] + (SPOILING.has(code) ? 0 : 1);
  return [...groups.values()]
    .map(({ first, files }) => ({ ...first, otherFiles: files.size - 1 }))
    .sort((a, b) => rank(a) - rank(b));
}

/** `(the same in 19 other files)`, or nothing. */
export const otherFilesWords = ({ otherFiles }: GroupedMessage): string =>
  otherFiles === 0 ? '' : ` (the same in ${count(otherFiles)} other ${otherFiles === 1 ? 'file' : 'files'})`;
