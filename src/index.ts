/**
 * ppmwise: from RTK check shots on marks with known coordinates to a constant and a ppm with honest intervals, and the
 * maximum baseline that holds a tolerance.
 * @module
 */
export * from './charts/index.js';
export {
  type Base,
  type Bases,
  type Control,
  type Mark,
  type Marks,
  readBases,
  readMarks,
} from './control/index.js';
export {
  type ComputedErrors,
  computeErrors,
  type ErrorsInput,
  errorTable,
  type FormedOccupations,
  type FormOccupationsOptions,
  formOccupations,
  type Occupation,
  type OccupationError,
  type SetAsideOccupation,
  type Visit,
} from './errors/index.js';
export {
  type Component,
  type CurvePoint,
  type ErrorModel,
  type EstimateWithLimits,
  errorCurve,
  type FitOptions,
  type FitWithoutDay,
  type Form,
  fitErrorModel,
  fitWithoutEachDay,
  sigmaAtMm,
} from './fit/index.js';
export {
  type DelimitedLayout,
  type Doubt,
  type FileAccount,
  formatMessage,
  InputError,
  type LogBatch,
  type LogFile,
  type LogLayout,
  type LogUnits,
  layoutYaml,
  type Message,
  type NmeaLayout,
  type Position,
  type PreviewRow,
  type Recognition,
  type RecognizedLog,
  type RecognizeOptions,
  readHead,
  readLogs,
  recognitionText,
  recognizeLayout,
  type SetAsideRow,
  type UnrecognizedLog,
} from './logs/index.js';
export * from './notebook/index.js';
export { reportHtml, summaryText } from './report/index.js';
export {
  longestSupportedKm,
  maximumBaseline,
  type Rule,
  type RuleConditions,
  type SpecSheet,
  specSheetSigmaMm,
  type Tolerance,
  toleranceFactor,
} from './rule/index.js';
export {
  type Interval,
  LENGTH_EDGES_KM,
  type MarkMean,
  markMeans,
  type SplitBy,
  type SummaryRow,
  summarizeBy,
} from './split/index.js';
export {
  type Results,
  readStudy,
  readStudyErrors,
  resultsJsonSchema,
  runStudy,
  type Study,
  type StudyErrors,
  type StudyRun,
  studyJsonSchema,
} from './study/index.js';
export { equationOfTimeMinutes, LEAP_SECONDS_KNOWN_UNTIL, solarHour } from './time/index.js';
