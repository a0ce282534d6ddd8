export { type ClusteredMean, clusteredMean, type Interval, rootMeanSquare } from './clusteredMean.js';
export { type CountCell, type CountGridOptions, countGrid } from './countGrid.js';
export { type MarkMean, markMeans } from './markMeans.js';
export { LENGTH_EDGES_KM, type SplitBy, type SummaryRow, summarizeBy } from './summarizeBy.js';
