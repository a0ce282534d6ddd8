export type {
  JobBase,
  JobPlace,
  JobPlan,
  JobPoint,
  JobReach,
  PlannedPlace,
  RuleFromBase,
} from './jobPlan.js';
export { reachPoints } from './reachPoints.js';
