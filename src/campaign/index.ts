export type { Blunder } from './blunders.js';
export type { ComponentTruth } from './componentTruth.js';
export { basesText, marksText } from './controlText.js';
export { CAMPAIGN_DEFAULTS } from './defaults.js';
export type { LogRow } from './epochs.js';
export { logText, rowsByMonth } from './logText.js';
export type { CampaignMark, MarkGenerator, MarkPlan } from './marks.js';
export type {
  Axes,
  BadDayOptions,
  BlunderOptions,
  CampaignBase,
  CampaignOptions,
  CampaignSettings,
  HabitualOptions,
  OtherBase,
  Range,
  ShareByDistance,
  WrongFixOptions,
} from './options.js';
export { resolveOptions } from './resolveOptions.js';
export { shareAtKm } from './shareAtKm.js';
export { type SimulatedErrors, type SimulatedOccupation, simulateErrors } from './simulateErrors.js';
export { type SimulatedCampaign, simulateLog } from './simulateLog.js';
export type { CampaignTruth, InjectedVisit, RowCounts } from './truth.js';
