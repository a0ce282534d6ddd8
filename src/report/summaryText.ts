import { formatMessage, type Message } from '../logs/index.js';
import { type FileResult, lengthLikeNames, type Results, readerUnits, textInUnits } from '../study/index.js';
import { count, plural } from './format.js';
import { groupedMessages, otherFilesWords, spoiling } from './groupedMessages.js';
import { fitSentence, ruleSentence, setAsideWords, shownFits, whyNoRule } from './words.js';

/** What a run found, in a few lines for a terminal. */
export function summaryText(results: Results): string {
  const units = readerUnits(results.study.reportUnits);
  const names = lengthLikeNames(results);
  return [
    results.study.title,
    '',
    ...spoiling(results.messages).map(({ text }) => `First: ${textInUnits(text, units, names)}`),
    ...results.rules.map((rule) => ruleSentence(rule, results.heights, units)),
    ...(results.rules.length === 0 ? [`There is no rule: ${whyNoRule(results)}.`] : []),
    '',
    ...shownFits(results).map((fit) => fitSentence(fit, results.heights, units)),
    ...(results.fits.length === 0 ? ['No fit.'] : []),
    '',
    ...accountLines(results),
    ...messageLines(results.messages),
  ].join('\n');
}

/** Files beyond this many stand in the report only. */
const MOST_FILES = 12;

/** The account of rows, visits and occupations, and of each file. */
export function accountLines({ rows, files, visits, occupations, days, period }: Results): string[] {
  const list = (counts: object): string =>
    Object.entries(counts)
      .map(([reason, n]) => `${reason} ${count(n as number)}`)
      .join(', ');
  const when = period === null ? '' : `, ${period.from} to ${period.to}`;
  const told = files.slice(0, MOST_FILES).map(fileLine);
  if (files.length > MOST_FILES)
    told.push(`  and ${plural(files.length - MOST_FILES, 'more file')} in the report`);
  return [
    `Rows: ${count(rows.read)} read = ${count(rows.used)} used + ${count(rows.read - rows.used)} set aside${list(rows.setAside) && ` (${list(rows.setAside)})`}.`,
    ...told,
    `Visits: ${count(visits.withFix)} with a fix, ${count(visits.withoutFix)} without.`,
    `Occupations: ${count(occupations.formed)} formed, ${count(occupations.used)} used${list(occupations.setAside) && ` (set aside: ${list(occupations.setAside)})`}, on ${plural(days, 'day')}${when}.`,
  ];
}

function fileLine({ file, read, used, setAside }: FileResult): string {
  const reasons = setAsideWords(setAside);
  return `  ${file}: ${count(read)} read, ${count(used)} used${reasons === '' ? '' : `; ${reasons}`}`;
}

/** Errors and warnings, the same of many files once; remarks by their number. */
export function messageLines(messages: readonly Message[]): string[] {
  const grouped = groupedMessages(messages);
  const told = grouped.filter(({ severity }) => severity !== 'info');
  const remarks = grouped.length - told.length;
  const lines = told.map((each) => `${formatMessage(each)}${otherFilesWords(each)}`);
  if (remarks > 0) lines.push(`${plural(remarks, 'remark')} in the report.`);
  return lines.length === 0 ? [] : ['', ...lines];
}
