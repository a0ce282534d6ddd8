export { type JobPlace, type JobPlan, type JobPoint, type JobReach, reachPoints } from './reachPoints.js';
