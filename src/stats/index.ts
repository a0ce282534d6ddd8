export { chanceText } from './chanceText.js';
export { type CholeskyFactor, choleskyFactor, choleskySolve } from './cholesky.js';
export {
  betaQuantile,
  chiSquareCdf,
  chiSquareQuantile,
  fCdf,
  fQuantile,
  normalCdf,
  normalQuantile,
  studentTCdf,
  studentTQuantile,
} from './distributions.js';
export {
  type LeastSquaresSolution,
  leastSquares,
  RankDeficientError,
} from './leastSquares.js';
export { digamma, inverseTrigamma, tetragamma, trigamma } from './polygamma.js';
export { median, quantile } from './quantile.js';
export { radialQuantile } from './radialQuantile.js';
export { normalDeviates, type Random, randomStream, shuffle, uniformBetween } from './random.js';
export { dot, sum } from './summation.js';
export {
  type Eigen2,
  eigenSymmetric2,
  invertSymmetric2,
  multiplySymmetric2Vector,
  powerSymmetric2,
  type Symmetric2,
  type Vector2,
} from './symmetric2.js';
