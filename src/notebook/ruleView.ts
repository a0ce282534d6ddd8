import { escapeHtml, ruleSentence } from '../report/index.js';
import type { Rule } from '../rule/index.js';
import { recordTable } from './recordTable.js';
import type { TextTable } from './tableCells.js';
import { tableHtml } from './tableHtml.js';
import { tableText } from './tableText.js';

/** Whether a value is a rule. */
export const isRule = (what: unknown): what is Rule =>
  typeof what === 'object' && what !== null && 'maximumBaselineKm' in what && 'conditions' in what;

/** A rule in plain text: its sentence, the lengths behind it, its conditions, and what must be known beside them. */
export const ruleText = (rule: Rule): string =>
  [ruleSentence(rule), '', tableText(factsOf(rule)), ...rule.remarks.flatMap((remark) => ['', remark])].join(
    '\n',
  );

/** The same as HTML that needs no style sheet, every text escaped. */
export const ruleHtml = (rule: Rule): string =>
  [
    `<p><b>${escapeHtml(ruleSentence(rule))}</b></p>`,
    tableHtml(factsOf(rule)),
    ...rule.remarks.map((remark) => `<p>${escapeHtml(remark)}</p>`),
  ].join('\n');

function factsOf({ conditions, ...rule }: Rule): TextTable {
  return recordTable({
    'maximum baseline, km': rule.maximumBaselineKm,
    'best estimate, km': rule.bestEstimateKm,
    'over all days together, km': rule.allDaysKm,
    'data reach to, km': rule.longestSupportedKm,
    'share of wrong fixes reckoned with': rule.wrongFixShare,
    found: `${conditions.occupations} occupations on ${conditions.days} days, ${conditions.from} to ${conditions.to}`,
    marks: conditions.marks,
    bases: conditions.bases,
    'to be looked at again by': conditions.reviewBy,
  });
}
