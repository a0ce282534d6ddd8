import { quotedList } from '../messages.js';
import type { ColumnRole } from '../roles.js';
import type { Column } from './columns.js';
import type { Draft } from './draft.js';
import { roleOfName } from './headerName.js';
import { MOST_OF_THEM, textFormats } from './timeTexts.js';

/** Roles that decide numbers: of two columns that spell one, neither is taken. */
const DECIDING: ReadonlySet<ColumnRole> = new Set<ColumnRole>([
  'time',
  'date',
  'timeOfDay',
  'gpsWeek',
  'gpsSeconds',
  'start',
  'mark',
  'base',
  'latitude',
  'longitude',
  'height',
  'easting',
  'northing',
  'x',
  'y',
  'z',
  'antennaHeight',
  'fix',
]);

/** Gives columns the roles that their names spell. */
export function assignByHeader(draft: Draft): void {
  const found = new Map<ColumnRole, Column[]>();
  for (const column of draft.columns) {
    const role = spelledRole(column);
    if (role !== null) found.set(role, [...(found.get(role) ?? []), column]);
  }
  for (const [role, columns] of found) {
    const filled = columns.filter(({ texts }) => texts.length > 0);
    const [first = columns[0]!, ...others] = filled;
    if (others.length === 0) draft.assign(role, first);
    else if (DECIDING.has(role)) askRepeated(draft, role, filled);
    else {
      draft.assign(role, first);
      tellRepeated(draft, role, first, others);
    }
  }
}

/** `Datum` is a frame in English and a date in German: the cells tell which. */
function spelledRole({ name, texts }: Column): ColumnRole | null {
  const role = name === '' ? null : roleOfName(name);
  return role === 'frame' && areDates(texts) ? 'date' : role;
}

/** Plain numbers, such as codes of frames, may be serial days as well and do not count. */
const areDates = (texts: readonly string[]): boolean => {
  const { guesses, share } = textFormats(texts);
  return (
    share >= MOST_OF_THEM && guesses.some(({ kind, format }) => kind !== 'time-of-day' && format !== 'excel')
  );
};

const named = (columns: readonly Column[]): string => quotedList(columns.map(({ name }) => name));

function askRepeated(draft: Draft, role: ColumnRole, columns: readonly Column[]): void {
  draft.doubt(
    {
      code: 'repeated-role',
      question: `Which column is the ${role}?`,
      because: `The columns ${named(columns)} all spell this role.`,
      key: `layout.columns.${role}`,
      choices: columns.map(({ reference }) => String(reference)),
      decisive: true,
    },
    columns,
  );
}

function tellRepeated(draft: Draft, role: ColumnRole, first: Column, others: readonly Column[]): void {
  draft.doubt({
    code: 'repeated-role',
    question: `Is the ${role} rightly taken from ${first.label}?`,
    because: `The columns ${named([first, ...others])} all spell this role.`,
    key: `layout.columns.${role}`,
    choices: [first, ...others].map(({ reference }) => String(reference)),
    decisive: false,
  });
}
