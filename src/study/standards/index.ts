export { type StandardsInput, studyStandards } from './studyStandards.js';
