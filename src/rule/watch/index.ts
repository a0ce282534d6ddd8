export type { DayStatistic } from './dayStatistic.js';
export { type MarkShift, markShifts } from './markShifts.js';
export { type NextMark, nextMarks } from './nextMarks.js';
export { type WatchBasis, type WatchStart, watchBasis } from './watchBasis.js';
export {
  type Watch,
  type WatchAlarm,
  type WatchedDay,
  type WatchOptions,
  watchDays,
} from './watchDays.js';
