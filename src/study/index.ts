export type { AdjustmentWeight, ConstantAndPpm } from './adjustmentWeights.js';
export type { ControlMark } from './controlMarks.js';
export type {
  DailyFactorResult,
  DayModelResult,
  DegradedDayResult,
  FitWithAllDays,
  LeftOutDays,
  RuleWithAllDays,
  TimeOfDayResult,
} from './dayResultTypes.js';
export type { EvidenceResult, TermsResult } from './evidenceResultTypes.js';
export type { NamedFile } from './fileFinder.js';
export type {
  ComparisonResult,
  FitResult,
  MarkComponentResult,
  MarkResult,
  SignedPpm,
  WrongFixResult,
  WrongFixShareResult,
} from './fitResultTypes.js';
export type { StatedSetting } from './flatSettings.js';
export type { HoursOfCaution, ShotHours } from './hoursOfCaution.js';
export type { InputFile } from './inputFiles.js';
export type { JudgedDays } from './judgeDays.js';
export type { LateOccupations } from './lateOccupations.js';
export {
  REPORT_UNITS,
  type ReaderUnit,
  type ReaderUnits,
  type ReportUnits,
  readerUnits,
} from './readerUnits.js';
export { readStudy } from './readStudy.js';
export type { BlunderResult, FileResult, LengthClass, Results } from './results.js';
export { resultsJsonSchema, resultsSchema } from './resultsSchema.js';
export type { RuleMove, RuleMoveKind } from './ruleMoves.js';
export type {
  BackTestResult,
  HourRule,
  JobResult,
  PartRule,
  SeasonRule,
  SecondVisitsResult,
  WatchResult,
} from './ruleResultTypes.js';
export { type RunOptions, readStudyErrors, runStudy, type StudyErrors, type StudyRun } from './run.js';
export type { WrongFixes } from './screenStudy.js';
export { type StudySettings, studyJsonSchema } from './settings.js';
export { type SkyInput, skyOfDays } from './skyOfDays.js';
export { type SkyPoint, skyPoints } from './skyPoints.js';
export type { Sky, SkyAssociation, SkyDay, SkyMeasure, SkyOutcome, SkyThreshold } from './skyResult.js';
export { SKY_MEASURES, SKY_OUTCOMES } from './skyResult.js';
export { softwareVersion } from './softwareVersion.js';
export type { JobFile, Study } from './study.js';
export type { StudyJob } from './studyJobs.js';
export { givenNames, lengthLikeNames, textInUnits } from './textInUnits.js';
export type { CrewShots, EarlierRun, NewlySetAside, RowsSetAside, WatchMonth } from './watchMonth.js';
export { readResults, type WatchRun, watchStudy } from './watchStudy.js';
