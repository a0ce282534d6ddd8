export {
  type BaseParameters,
  type CauseInput,
  type CommonCauses,
  commonCauses,
  type LikelyCause,
  type ReadAs,
} from './commonCauses.js';
export { type MarkVector, markVectors } from './markVectors.js';
export { type CommonParameter, commonParameters, isTold } from './similarity.js';
