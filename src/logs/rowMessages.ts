import { type Message, message } from './messages.js';
import type { RowReason, SetAsideRow } from './reasons.js';
import { unreadableRemedy } from './unreadableRemedy.js';

/** Set-aside rows of these reasons get a message; the others speak for themselves in the account. */
const REMEDIES = {
  'unknown-mark': 'Add the mark to the marks file or correct the name.',
  'unknown-base': 'Add the base to the bases file or correct the name.',
  conflicting:
    'One rover cannot be at two places: all of them are set aside. Look for a wrong mark name or a joined file.',
} satisfies Partial<Record<RowReason, string>>;
const TOLD_REASONS = ['unreadable', 'unknown-mark', 'unknown-base', 'conflicting'] as const;

/** A log full of ordinary points has thousands of names that are no marks: so many are told one by one. */
const MOST_NAMES = 20;
const FEW_NAMES = 3;

interface Group {
  first: SetAsideRow;
  count: number;
  /** How many there are is told of names; other findings are told file by file. */
  readonly files: Set<string>;
}

/**
 * One message for all rows that were set aside for the same finding: of a name that is not known over all files, of
 * anything else in each file. Their order does not depend on the order in which rows come.
 */
export class RowMessages {
  readonly #groups = new Map<string, Group>();

  add(row: SetAsideRow): void {
    if (!TOLD_REASONS.some((reason) => reason === row.reason)) return;
    const key = [row.reason, ...finding(row)].join('\u0000');
    const group = this.#groups.get(key);
    if (group === undefined) this.#groups.set(key, { first: row, count: 1, files: new Set([row.file]) });
    else {
      group.count += 1;
      group.files.add(row.file);
      if (byPlace(row, group.first) < 0) group.first = row;
    }
  }

  messages(): Message[] {
    const groups = [...this.#groups.values()].sort((a, b) => byPlace(a.first, b.first));
    return TOLD_REASONS.flatMap((reason) => {
      const ofReason = groups.filter(({ first }) => first.reason === reason);
      if (!isName(reason) || ofReason.length <= FEW_NAMES) return ofReason.map(groupMessage);
      // Names that were probably meant to be a known one are worth more than the rest.
      const likely = ofReason.filter(({ first }) => first.detail.includes(DID_YOU_MEAN));
      const others = ofReason.filter((group) => !likely.includes(group));
      // Of names that resemble none the first few stand for all: they are mostly ordinary points.
      const told = [...likely.slice(0, MOST_NAMES), ...others.slice(0, FEW_NAMES)];
      const rest = ofReason.filter((group) => !told.includes(group));
      return [...told.map(groupMessage), ...(rest.length === 0 ? [] : [restMessage(rest)])];
    });
  }
}

/** Stands in the detail of a name that is near a known one. */
export const DID_YOU_MEAN = 'did you mean';

/** Begins the detail of a row without a base, in a study with several. */
const NO_BASE = 'the row names no base';
const STATE_BASE =
  'State it as "constants: {base: NAME}" in the layout of these logs, or leave only the base that was used in the bases file.';

const isName = (reason: RowReason): boolean => reason === 'unknown-mark' || reason === 'unknown-base';

/** What rows of one message have in common. Unreadable values differ from row to row: their column counts. */
function finding({ file, reason, column, detail }: SetAsideRow): string[] {
  if (isName(reason)) return [detail];
  if (reason !== 'unreadable') return [file, detail];
  return [file, column ?? detail.replace(/\d+/g, '')];
}

function byPlace(a: SetAsideRow, b: SetAsideRow): number {
  return a.file === b.file ? a.row - b.row : a.file < b.file ? -1 : 1;
}

const areRows = (count: number): string => (count === 1 ? '1 row is' : `${count} rows are`);

const inFiles = (count: number): string => (count === 1 ? '' : `, in ${count} files`);

function remedyOf({ reason, detail }: SetAsideRow): string {
  if (reason === 'unreadable') return unreadableRemedy(detail);
  return detail.startsWith(NO_BASE) ? STATE_BASE : REMEDIES[reason as keyof typeof REMEDIES];
}

function groupMessage({ first, count, files }: Group): Message {
  const remedy = remedyOf(first);
  return message(
    'warning',
    first.reason,
    `${areRows(count)} set aside as ${first.reason}${inFiles(files.size)}: ${first.detail}. ${remedy}`,
    { file: first.file, row: first.row, ...(first.column === null ? {} : { column: first.column }) },
  );
}

/** The many names beyond those told one by one. */
function restMessage(groups: readonly Group[]): Message {
  const [{ first }] = groups as [Group];
  const count = groups.reduce((total, group) => total + group.count, 0);
  const files = new Set(groups.flatMap((group) => [...group.files])).size;
  return message(
    'warning',
    first.reason,
    `${areRows(count)} set aside as ${first.reason} for ${groups.length} further ${groups.length === 1 ? 'name' : 'names'}${inFiles(files)}: here ${first.detail}. Nothing is wrong where these are ordinary points and no check shots. Where the mark stands in another column, give that column the role "description" in the layout, and a "pattern" in marks.names where more than the name stands there.`,
    { file: first.file, row: first.row },
  );
}
