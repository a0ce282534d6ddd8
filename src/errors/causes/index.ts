export {
  type BaseParameters,
  type CauseInput,
  type CommonCauses,
  commonCauses,
  type LikelyCause,
  type ReadAs,
} from './commonCauses.js';
export type { MarkVector } from './markVectors.js';
export { type CommonParameter, isTold } from './similarity.js';
