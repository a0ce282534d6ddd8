import { quoted } from '../messages.js';
import { type Column, isInteger } from './columns.js';
import type { Draft } from './draft.js';
import { namePattern, patternWords } from './namePattern.js';

const MOST_NAMED = 12;

/** Satellites, where one column alone can be their number; everything else without a role is told. */
export function settleLeftColumns(draft: Draft): void {
  if (draft.isNameless && !draft.has('satellites')) {
    const [only, ...others] = draft.free().filter(looksLikeSatellites);
    if (only !== undefined && others.length === 0) draft.assign('satellites', only);
  }
  const left = draft.free();
  if (left.length === 0) return;
  const named = left.slice(0, MOST_NAMED).map(describe).join(', ');
  const more = left.length > MOST_NAMED ? ` and ${left.length - MOST_NAMED} more` : '';
  draft.doubt({
    code: 'unused-columns',
    question: `Should ${left.length === 1 ? 'a further column' : 'further columns'} be read?`,
    because: `Not read, as nothing says what ${left.length === 1 ? 'it is' : 'they are'}: ${named}${more}. A column that holds the name of the mark among other words has the role description${patternOf(left)}.`,
    key: 'layout.columns',
    choices: [],
    decisive: false,
  });
}

/** How the name is read out of the first of these columns whose texts show it. */
function patternOf(left: readonly Column[]): string {
  for (const { label, texts } of left) {
    const pattern = namePattern(texts);
    if (pattern !== null) return `; for ${label} ${patternWords(pattern)} would read it out`;
  }
  return '';
}

const looksLikeSatellites = (column: Column): boolean =>
  isInteger(column) && column.least >= 4 && column.greatest <= 60 && column.greatest > 9;

function describe({ label, texts, numbers, greatest, decimals }: Column): string {
  const looks =
    numbers !== null && decimals >= 1 && greatest < 10
      ? greatest < 0.5
        ? ', perhaps a sigma'
        : ', perhaps a dilution of precision'
      : '';
  return `${label} (${quoted(texts[0]!.slice(0, 20))}${looks})`;
}
