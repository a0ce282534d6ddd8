export type { CellSummary } from './cellSummary.js';
export { type ClusteredMean, clusteredMean, type Interval, rootMeanSquare } from './clusteredMean.js';
export { type CountCell, type CountGridOptions, countGrid } from './countGrid.js';
export { type FlaggedClass, flaggedByLength } from './flaggedByLength.js';
export type { Group, SplitBy } from './groups.js';
export { type MarkMean, markMeans } from './markMeans.js';
export { type ShareInside, type ShareInsideOptions, shareInsideByDistance } from './shareInside.js';
export { type SplitTable, STANDARD_SPLITS, type StandardSplit, standardSplits } from './standardSplits.js';
export {
  LENGTH_EDGES_KM,
  type SummarizeOptions,
  type SummaryRow,
  summarizeBy,
  summarizeByTwo,
  type TwoWayRow,
} from './summarizeBy.js';
export type { VisitCounts } from './visitCounts.js';
