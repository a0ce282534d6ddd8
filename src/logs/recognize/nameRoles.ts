import { quotedList } from '../messages.js';
import { type Column, isInteger } from './columns.js';
import type { Draft } from './draft.js';
import { roleOfName } from './headerName.js';

/** Point numbers and words by their cells, where the file has no names of columns that say so. */
export function findNames(draft: Draft): void {
  if (draft.has('mark')) return;
  if (!draft.has('pointNumber')) {
    const before =
      Math.min(...COORDINATES.map((role) => draft.roles.get(role)?.index ?? Number.POSITIVE_INFINITY)) - 1;
    const number = draft
      .free()
      .find((column) => (column.index === 0 ? isName(column) : column.index === before && isNumber(column)));
    if (number !== undefined) draft.assign('pointNumber', number);
  }
  if (draft.has('description')) return;
  const words = draft.free().filter(isText);
  // Of several columns of words none is surely the description: base, crew and rover are words too.
  if (words.length === 1) draft.assign(draft.has('pointNumber') ? 'description' : 'mark', words[0]!);
}

const isText = ({ numbers }: Column): boolean => numbers === null;
const isNumber = (column: Column): boolean => isInteger(column) && column.least >= 0;
const isName = (column: Column): boolean => isText(column) || isNumber(column);
const COORDINATES = ['latitude', 'longitude', 'easting', 'northing', 'x'] as const;

/** Asks which column names the mark where several may, and tells where none does. */
export function settleMark(draft: Draft): void {
  if (draft.has('mark') || draft.doubts.some(({ key }) => key === 'layout.columns.mark')) return;
  const named = (['pointNumber', 'description'] as const).flatMap((role) => draft.roles.get(role) ?? []);
  const alike = draft.columns.filter(({ name, texts }) => {
    const role = name === '' ? null : roleOfName(name);
    return texts.length > 0 && (role === 'pointNumber' || role === 'description');
  });
  const words = draft.isNameless ? draft.free().filter(isText) : [];
  const candidates = [...new Set([...named, ...alike, ...words])].sort((a, b) => a.index - b.index);
  if (candidates.length === 0) tellNoMark(draft);
  if (candidates.length < 2) return;
  draft.doubt(
    {
      code: 'mark-column',
      question: 'Which column names the mark that was measured?',
      because: `The first row has ${candidates.map((column) => `${quotedList(column.texts.slice(0, 1))} in ${column.label}`).join(' and ')}; a pattern under marks.names reads a name out of a longer text.`,
      key: 'layout.columns.mark',
      choices: candidates.map(({ reference }) => String(reference)),
      decisive: true,
    },
    candidates,
  );
}

function tellNoMark(draft: Draft): void {
  draft.doubt({
    code: 'no-mark',
    question: 'On which marks were the rows measured?',
    because:
      'No column names a mark; beside a constant, nearestMarkM or markTimes of the log may say to which mark a row belongs.',
    key: 'layout.constants.mark',
    choices: [],
    decisive: false,
  });
}
