export {
  type FileAccount,
  type ReasonCount,
  RowAccount,
  type TotalAccount,
  totalAccount,
} from './account.js';
export { ENCODINGS, type Encoding, readHead } from './byteChunks.js';

export type { CoordinateChanges } from './coordinateChanges.js';
export { type CoordinateColumns, coordinateColumns } from './coordinateColumns.js';
export { CoordinateFault } from './coordinateFault.js';
export { type CoordinateSystem, type KnownSystem, systemOf } from './coordinateSystem.js';
export { parseDms } from './dms.js';
export { type EpochBag, EpochStore } from './epochStore.js';
export type { DelimitedHeader, DelimitedOptions } from './header.js';
export type { LogLengthUnit } from './layout.js';
export {
  type DelimitedLayout,
  type LogLayout,
  type LogUnits,
  type NmeaLayout,
  resolvedUnits,
} from './layout.js';
export {
  formatMessage,
  InputError,
  inputError,
  type Message,
  message,
  type Place,
  quoted,
  quotedList,
  type Severity,
} from './messages.js';
export { nearestName, suggestion } from './nearestName.js';
export { parseNumber } from './numbers.js';
export {
  CORRECTION_KINDS,
  type Corrections,
  type Fix,
  NO_EXTRAS,
  type Position,
  type PositionExtras,
} from './position.js';
export { readDelimitedTable, type TableRow } from './readDelimited.js';
export { type LogBatch, type LogFile, type ReadLogsOptions, readLogs } from './readLogs.js';
export {
  OCCUPATION_REASONS,
  type OccupationReason,
  REASON_WORDS,
  ROW_REASONS,
  type RowReason,
  type SetAsideRow,
} from './reasons.js';
export {
  type AutoLayout,
  autoLayout,
  type Doubt,
  layoutYaml,
  type PreviewRow,
  type Recognition,
  type RecognizedLog,
  type RecognizeOptions,
  recognitionText,
  recognizeLayout,
  type UnrecognizedLog,
} from './recognize/index.js';
export { type LogResolution, roundingSigmaMm } from './resolution.js';
export { COLUMN_ROLES, type ColumnRole, roleOfHeader } from './roles.js';
export { DID_YOU_MEAN, RowMessages } from './rowMessages.js';
