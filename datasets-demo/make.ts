import { mkdirSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';
import {
  basesText,
  type CampaignOptions,
  logText,
  type MarkPlan,
  marksText,
  rowsByMonth,
  simulateLog,
} from '../src/campaign/index.js';
import { activityText } from './activity.js';
import { coastRoadText } from './jobs.js';
import { pointListText } from './pointList.js';
import { readmeText, STUDY_TEXT } from './texts.js';

const mark = (
  name: string,
  baselineKm: number,
  azimuthDeg: number,
  heightM: number,
  sky = 'open',
): MarkPlan => ({
  name,
  baselineKm,
  azimuthDeg,
  heightM,
  source: 'static session 2024',
  sky,
});

/** The invented firm's campaign; what is not said here is as in `CAMPAIGN_DEFAULTS`. */
export const DEMO_OPTIONS: CampaignOptions = {
  // A season with an event of two bad days, two more bad days, and an ordinary number of wrong fixes.
  seed: 2035,
  days: 45,
  startDate: '2025-03-03',
  utcOffsetHours: -1,
  workHours: { from: 8, to: 17 },
  base: {
    name: 'PILLAR',
    latitudeDeg: 44.312640518,
    longitudeDeg: -18.405217364,
    heightM: 148.2163,
    mounting: 'pillar',
  },
  marks: [
    mark('CP01', 0.41, 118.4, 133.7214),
    mark('CP02', 0.93, 264.2, 171.0582),
    mark('CP03', 1.62, 31.7, 96.4437, 'partly'),
    mark('CP04', 2.38, 197.1, 208.3305),
    mark('CP05', 3.34, 305.6, 61.9146),
    mark('CP06', 4.71, 82.9, 318.6027),
    mark('CP07', 6.15, 171.3, 24.5518),
    mark('CP08', 8.12, 238.5, 455.1873, 'partly'),
    mark('CP09', 10.44, 12.8, 12.2469),
    mark('CP10', 13.53, 128.6, 642.7791),
    mark('CP11', 17.26, 276.1, 88.0354),
    mark('CP12', 21.87, 55.4, 5.4182),
    mark('CP13', 27.35, 208.7, 893.264),
    mark('CP14', 33.92, 340.3, 37.6925),
  ],
  // While the pillar was repaired, the base stood on a tripod over a ground mark nearby.
  otherBase: {
    name: 'YARD',
    latitudeDeg: 44.313907264,
    longitudeDeg: -18.406538791,
    heightM: 146.0385,
    mounting: 'tripod',
    fromDay: 27,
    toDay: 35,
  },
  crews: ['harbour', 'ridge'],
  rovers: ['R1', 'R2', 'R3'],
  occupationsPerDay: { from: 30, to: 60 },
  epochsPerOccupation: 5,
  constantMm: { east: 5.4, north: 5.8, up: 11 },
  ppm: { east: 0.52, north: 0.58, up: 1.1 },
  noFix: { shareAt1Km: 0.004, shareAt12Km: 0.03 },
  wrongFixes: { shareAt1Km: 0.002, shareAt12Km: 0.015, shortestMm: 50, longestMm: 1000, meanBurst: 1.3 },
  blunders: { rodHeights: 1, rodErrorMm: 200, wrongMarks: 1 },
  markSigmaMm: { east: 4, north: 4, up: 5 },
  statedMarkSigmaMm: { horizontal: 4, vertical: 5 },
  setupSigmaMm: { east: 1, north: 1, up: 1.5 },
  middayRise: 0.2,
  badDays: { runs: 1, runLength: 2, singles: 2, factor: { from: 2, to: 4 } },
};

/** All files of the demo study by their path below its folder. Writes nothing; every call gives the same. */
export function demoStudy(): ReadonlyMap<string, string> {
  const campaign = simulateLog(DEMO_OPTIONS);
  const { bases, marks, rows, truth } = campaign;
  const rounded = (_key: string, value: unknown): unknown =>
    typeof value === 'number' ? Number(value.toFixed(9)) : value;
  const data: [string, string][] = [
    ['marks.csv', marksText(marks, truth.settings.statedMarkSigmaMm)],
    ['bases.csv', basesText(bases)],
    ...[...rowsByMonth(rows)].map(([month, own]): [string, string] => [`logs/${month}.csv`, logText(own)]),
    ['another-layout/points-2025-03-14.txt', pointListText(rows, '2025-03-14')],
    ['jobs/coast-road.csv', coastRoadText(bases[0]!)],
    ['indices/activity-invented.txt', activityText(truth.days, DEMO_OPTIONS.seed!)],
    ['truth.json', `${JSON.stringify(truth, rounded, 1)}\n`],
  ];
  const paths = ['study.yaml', ...data.map(([path]) => path), 'README.md'];
  return new Map([['study.yaml', STUDY_TEXT], ...data, ['README.md', readmeText(campaign, paths)]]);
}

function writeDemo(folder: string): void {
  for (const [path, text] of demoStudy()) {
    mkdirSync(dirname(join(folder, path)), { recursive: true });
    writeFileSync(join(folder, path), text);
  }
}

if (process.argv[1] !== undefined && import.meta.url === pathToFileURL(process.argv[1]).href)
  writeDemo(dirname(fileURLToPath(import.meta.url)));
