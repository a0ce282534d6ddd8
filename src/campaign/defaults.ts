import type { MarkGenerator } from './marks.js';
import type {
  BadDayOptions,
  BlunderOptions,
  CampaignSettings,
  HabitualOptions,
  WrongFixOptions,
} from './options.js';

/** The marks that are invented when none are given. */
export const MARK_GENERATOR_DEFAULTS: MarkGenerator = {
  count: 14,
  nearestKm: 0.4,
  farthestKm: 34,
  lowestM: 5,
  highestM: 900,
};

/** Every default of `CampaignOptions`, in the units stated there. */
export const CAMPAIGN_DEFAULTS: CampaignSettings = {
  seed: 1,
  days: 30,
  startDate: '2025-03-03',
  weekdaysOnly: true,
  utcOffsetHours: -1,
  workHours: { from: 8, to: 17 },
  base: {
    name: 'B1',
    latitudeDeg: 44.3,
    longitudeDeg: -18.4,
    heightM: 140,
    mounting: 'pillar',
    setupsPerDay: 1,
  },
  otherBase: null,
  marks: MARK_GENERATOR_DEFAULTS,
  crews: ['A', 'B', 'C'],
  rovers: ['R1', 'R2', 'R3'],
  occupationsPerDay: { from: 30, to: 60 },
  marksPerCrew: { from: 4, to: 6 },
  roundsPerDay: 2,
  epochsPerOccupation: 5,
  epochSigmaMm: { east: 2, north: 2, up: 4 },
  constantMm: { east: 5.5, north: 5.5, up: 11 },
  ppm: { east: 0.55, north: 0.55, up: 1.1 },
  dayFactorLogSd: 0.3,
  eastNorthCorrelation: 0,
  tailDegrees: null,
  dependent: true,
  floatRowShare: 0.03,
  noFix: { shareAt1Km: 0.004, shareAt12Km: 0.03 },
  unknownMarkShare: 0.002,
  duplicateRowShare: 0.002,
  wrongFixes: null,
  blunders: null,
  markSigmaMm: { east: 0, north: 0, up: 0 },
  statedMarkSigmaMm: { horizontal: 1, vertical: 2 },
  setupSigmaMm: { east: 0, north: 0, up: 0 },
  middayRise: 0,
  badDays: null,
  habitual: null,
};

/** What the options that are off by default hold when they are switched on by `{}`. */
export const SWITCHED_ON_DEFAULTS: {
  readonly wrongFixes: WrongFixOptions;
  readonly blunders: BlunderOptions;
  readonly badDays: BadDayOptions;
  readonly habitual: HabitualOptions;
} = {
  wrongFixes: { shareAt1Km: 0.003, shareAt12Km: 0.03, shortestMm: 50, longestMm: 1000, meanBurst: 1 },
  blunders: { rodHeights: 1, rodErrorMm: 200, wrongMarks: 1 },
  badDays: { runs: 1, runLength: 3, singles: 0, factor: { from: 2, to: 5 } },
  habitual: { nearShare: 0.8, nearKm: 3, occupationsPerDay: { from: 3, to: 8 } },
};
