import type { ReportPictures } from '../../src/report/index.js';

/** Pages without pictures. */
export const NO_PICTURES: ReportPictures = {
  proof: null,
  moves: null,
  horizontal: null,
  vertical: null,
  maps: [],
  markMeans: null,
  days: [],
  hours: [],
  hourDays: [],
  splits: [],
  sky: [],
  wrongFixes: [],
  jobs: [],
};
