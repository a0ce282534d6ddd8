export { type BackTest, backTest } from './backTest.js';
export type { FailedShot, RuleCount } from './countRule.js';
export { type ForwardTest, forwardTest } from './forwardTest.js';
export { type LeaveGroupOutOptions, type LeftOutGroup, leaveGroupOut } from './leaveGroupOut.js';
export type { BackTestOptions } from './options.js';
export type { BackTestScore, LengthClassShare, ObservedShare } from './score.js';
export { screeningOf } from './withoutRows.js';
