export { type DaySpan, localDaySpan, solarDaySpan } from './daySpan.js';
export { type DaysTec, type DayTec, type DayTecOptions, dayTec } from './dayTec.js';
export {
  delayPerTecuM,
  frequencyRatioSquared,
  geometryFreePerTecuM,
  gradientPpm,
  ionosphereFreeFactors,
  L1_HZ,
  L2_HZ,
  L5_HZ,
  SPEED_OF_LIGHT,
  wavelengthM,
} from './delays.js';
export { type DayIndices, dayIndices } from './indices/dayIndices.js';
export {
  type GeomagneticIndices,
  INDEX_NAMES,
  INDEX_STATUSES,
  type IndexName,
  type IndexSeries,
  type IndexStatus,
  indexAt,
  indexStatusAt,
} from './indices/indexSeries.js';
export {
  JOINED_INDEX_NAMES,
  type JoinedIndexName,
  type JoinedIndices,
  joinIndices,
} from './indices/joinIndices.js';
export { type MergedIndices, mergeIndices } from './indices/mergeIndices.js';
export { type IndexReading, readIndices } from './indices/readIndices.js';
export { type JoinedMaps, joinMaps, outsideMapsNote } from './ionex/joinMaps.js';

export { readTecMaps, type TecMapsReading } from './ionex/readTecMaps.js';
export { TIME_SCHEMES, type TimeScheme, tecAt, tecRmsAt } from './ionex/tecAt.js';
export { gradientAlong, steepestGradient, type TecGradient, tecGradientAt } from './ionex/tecGradient.js';
export type { TecMaps } from './ionex/tecMaps.js';
export {
  type KlobucharCoefficients,
  type KlobucharInput,
  klobucharDelayM,
  klobucharDelayS,
  klobucharVerticalM,
} from './klobuchar.js';
export { apOfKp, kpOfAp, kpWords, type StormScale, stormScale } from './kp.js';
export { type Roti, type RotiOptions, rotiOf } from './roti.js';
export { expectedShorteningPpm, type ShorteningOptions, shorteningPpmPerTecu } from './shortening.js';
export {
  EARTH_RADIUS_KM,
  modifiedMapping,
  type PiercePoint,
  piercePoint,
  type Ray,
  thinShellMapping,
  USUAL_SHELL_KM,
} from './thinShell.js';
