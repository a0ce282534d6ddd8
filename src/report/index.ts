export { annexHtml } from './annexHtml.js';
export { arrowBytes } from './arrow.js';
export { cardHtml } from './cardHtml.js';

export { csvLine, csvText } from './csv.js';
export { count } from './format.js';

export { escapeHtml } from './html.js';
export { jobsGeoJson } from './jobsGeoJson.js';
export { markdownOf } from './markdown.js';
export { marksGeoJson } from './marksGeoJson.js';
export { monthHtml, type WatchFound, watchFound } from './monthHtml.js';
export { monthTables } from './monthTables.js';
export { changeWords } from './movesSection.js';
export { Page } from './page.js';
export type { ReportPicture, ReportPictures } from './pictures.js';
export { reportHtml } from './reportHtml.js';
export { splitsOf } from './splitTable.js';
export { accountLines, messageLines, summaryText } from './summaryText.js';
export { type Cell, type ReportTable, reportTables } from './tables.js';
export { watchText } from './watchText.js';
export { weightsHtml } from './weightsHtml.js';
export { ruleSentence } from './words.js';
