export type { ControlMark } from './controlMarks.js';
export { readStudy } from './readStudy.js';
export type { BlunderResult, FileResult, FitResult, LengthClass, Results } from './results.js';
export { resultsJsonSchema, resultsSchema } from './resultsSchema.js';
export { type RunOptions, readStudyErrors, runStudy, type StudyErrors, type StudyRun } from './run.js';
export { type StudySettings, studyJsonSchema } from './settings.js';
export type { Study } from './study.js';
