import { quotedList } from '../messages.js';
import { type Column, isInteger } from './columns.js';
import type { Draft } from './draft.js';

/** Words of the trade for the state of the ambiguities. */
const FIX_WORD =
  /^(rtk[ _-]?)?(fix(ed)?|float(ing)?|single|autonomous|stand[ -]?alone|dgps|dgnss|diff(erential)?|none|no[ _-]?fix|invalid)$/i;
const MOST_TEXTS = 8;

/** A column of fix words by its cells. */
export function findFix(draft: Draft): void {
  if (draft.has('fix')) return;
  const found = draft.free().find(({ texts, numbers }) => {
    const words = numbers === null ? texts.filter((text) => FIX_WORD.test(text)).length : 0;
    return words > 0.9 * texts.length;
  });
  if (found !== undefined) draft.assign('fix', found);
}

/** Asks what the texts of the fix column mean, where they are others than `fixed` and `float`. */
export function settleFix(draft: Draft): void {
  const fix = draft.roles.get('fix');
  if (fix === undefined) {
    askWhetherFix(draft);
    return;
  }
  const texts = [...new Set(fix.texts)].filter((text) => !/^(fixed|float)$/i.test(text));
  if (texts.length === 0) return;
  const more = texts.length > MOST_TEXTS ? ` and ${texts.length - MOST_TEXTS} more` : '';
  draft.doubt({
    code: 'fix-values',
    question: `Which texts in ${fix.label} mean fixed, float or other?`,
    because: `Only "fixed" and "float" are understood, and there ${texts.length === 1 ? 'is' : 'are'} ${quotedList(texts.slice(0, MOST_TEXTS))}${more}.`,
    key: 'layout.fixValues',
    choices: ['fixed', 'float', 'other'],
    decisive: true,
  });
}

/** Codes between 0 and 9 with a 4 or 5 among them: the usual numbers of fixed and float. */
const looksLikeCodes = (column: Column): boolean =>
  isInteger(column) &&
  column.least >= 0 &&
  column.greatest <= 9 &&
  column.texts.some((text) => /^[45]$/.test(text));

function askWhetherFix(draft: Draft): void {
  const codes = draft.isNameless ? draft.free().find(looksLikeCodes) : undefined;
  if (codes === undefined) {
    draft.doubt({
      code: 'no-fix',
      question: 'Were all rows measured with fixed ambiguities?',
      because: 'No column says so, and without one all rows count as fixed.',
      key: 'layout.columns.fix',
      choices: [],
      decisive: false,
    });
    return;
  }
  draft.doubt(
    {
      code: 'maybe-fix',
      question: `Does ${codes.label} tell whether a row is fixed?`,
      because: `It holds ${quotedList([...new Set(codes.texts)])}, which may be codes of the fix; without a fix column all rows count as fixed.`,
      key: 'layout.columns.fix',
      choices: [String(codes.reference)],
      decisive: true,
    },
    [codes],
  );
}
