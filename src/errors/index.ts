export { assumedBasePpm } from './assumedBase.js';
export { type BlunderCause, type Blunders, suspectBlunders } from './blunders/index.js';
export {
  type BaseParameters,
  type CauseInput,
  type CommonCauses,
  type CommonParameter,
  commonCauses,
  isTold,
  type LikelyCause,
  type ReadAs,
} from './causes/index.js';
export {
  type ComputedErrors,
  computeErrors,
  type OccupationError,
  type SetAsideOccupation,
} from './computeErrors.js';
export { type ErrorColumns, type ErrorsInput, errorColumns, heldColumns } from './errorColumns.js';
export { errorTable } from './errorTable.js';
export type { FarOffPlace } from './farOffPlaces.js';
export { type FormedOccupations, type FormOccupationsOptions, formOccupations } from './formOccupations.js';
export { groupIndices } from './groupIndices.js';
export type { Occupation, Visit } from './occupation.js';
export { type PlacedVisit, placeVisits } from './placeVisits.js';
export { type StaticShots, staticMessage, staticShots } from './staticShots.js';
