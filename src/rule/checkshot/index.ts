export {
  type CheckShotLimit,
  type CheckShotLimits,
  type CheckShotOptions,
  checkShotLimits,
  type TwoBasesLimit,
  type TwoVisitOptions,
  twoVisitLimitMm,
} from './checkShotLimit.js';
export { errorByOccupationLength, type OccupationLengthRow } from './occupationLength.js';
export {
  type SecondVisit,
  type SecondVisitOptions,
  type SecondVisits,
  secondVisits,
  type VisitCorrelation,
  visitCorrelation,
} from './secondVisit.js';
