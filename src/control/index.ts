export { readAliases } from './aliases.js';
export { type AssumedBase, assumedBase } from './assumedBase.js';
export { type Base, type Bases, type Mounting, readBases } from './bases.js';
export { type ControlStatements, comparabilityMessages } from './comparability.js';
export { type Control, type Match, markFrame, matchBase, matchMark } from './control.js';
export type { ControlFile } from './controlFile.js';
export { type RequestedPoint, readJobPoints } from './jobPoints.js';
export { type Mark, type Marks, readMarks } from './marks.js';
export { type MarkInterval, type MarkTimes, markAt, readMarkTimes } from './markTimes.js';
export { matchRowNames, type NameRules, type RowNames } from './names.js';
export { NearestMark } from './nearestMark.js';
export { type SigmaLevel, sigmaLevel, sigmasIn } from './sigmaLevel.js';
export {
  coordinatesOn,
  type MarkSky,
  type PointCoordinates,
  SKIES,
  type Versioned,
  validityWords,
} from './versions.js';
