export { csvLine, csvText } from './csv.js';
export { escapeHtml } from './html.js';
export { type ReportPicture, type ReportPictures, reportHtml } from './reportHtml.js';
export { accountLines, messageLines, summaryText } from './summaryText.js';
export { type Cell, type ReportTable, reportTables } from './tables.js';
export { watchText } from './watchText.js';
export { CAUTIONS, fitSentence, GLOSSARY, ruleSentence } from './words.js';
