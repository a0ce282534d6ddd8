import type { CampaignOptions } from '../../../src/campaign/index.js';

/** How days differ: not at all, as in an ordinary season, or with bad days among them. */
export type Days = 'alike' | 'mild' | 'disturbed';

/** A kind of campaign whose intervals are tried. */
export interface World {
  readonly name: string;
  readonly days: number;
  readonly kind: Days;
  /** Bad days come singly, or three in a row. */
  readonly badRunLength?: number;
  readonly options: CampaignOptions;
  /** Coverage of the ppm by days and, with disturbed days, as a study states it, in the design simulation. */
  readonly design: string;
}

/** Standard deviation of the log of the ordinary day factor. */
export const ORDINARY: Readonly<Record<Days, number>> = { alike: 0, mild: 0.3, disturbed: 0.25 };
/** Chance of a bad day in a disturbed world; each is worse by a factor uniform from 2 to 5. */
export const BAD_SHARE = 0.08;
export const BAD_FACTOR = { from: 2, to: 5 };

const LENGTHS = [8, 15, 30, 60];
const DESIGN: Readonly<Record<Days, readonly string[]>> = {
  alike: ['.96', '.95', '.95', '.95'],
  mild: ['.95', '.93', '.92', '.93'],
  disturbed: ['.80 / .91', '.68 / .87', '.74 / .84', '.79 / .83'],
};
const ONE_PERCENT = { shareAt1Km: 0.01, shareAt12Km: 0.01, shortestMm: 50, longestMm: 1000 };
const MARKS_8_MM = { east: 8, north: 8, up: 8 };
/** Eight marks, most of them near, a few shots a day. */
const HABITUAL: CampaignOptions = {
  marks: { count: 8, nearestKm: 0.4, farthestKm: 14 },
  habitual: { nearShare: 0.8, nearKm: 3, occupationsPerDay: { from: 3, to: 7 } },
};

const grid = (['alike', 'mild', 'disturbed'] as const).flatMap((kind) =>
  [0, 1].flatMap((wrong) =>
    LENGTHS.map(
      (days, k): World => ({
        name: wrong === 0 ? 'no wrong fixes' : '1 % wrong fixes',
        days,
        kind,
        options: wrong === 0 ? {} : { wrongFixes: ONE_PERCENT },
        design: DESIGN[kind][k]!,
      }),
    ),
  ),
);

const variant = (name: string, options: CampaignOptions, design = '-', days = 30): World => ({
  name,
  days,
  kind: 'mild',
  options,
  design,
});

/** All kinds of campaigns; the place in the list is part of the seed. */
export const WORLDS: readonly World[] = [
  ...grid,
  variant('marks in error by 8 mm', { markSigmaMm: MARKS_8_MM }, '.95'),
  variant('marks in error by 8 mm', { markSigmaMm: MARKS_8_MM }, '-', 15),
  variant(
    'marks in error by 8 mm, 1 % wrong fixes',
    { markSigmaMm: MARKS_8_MM, wrongFixes: ONE_PERCENT },
    '.94',
  ),
  variant('wrong fixes in bursts of 3', { wrongFixes: { ...ONE_PERCENT, meanBurst: 3 } }),
  variant('east and north correlated by 0.5', { eastNorthCorrelation: 0.5 }),
  variant('t errors with 6 degrees of freedom', { tailDegrees: 6 }),
  { ...variant('bad days three in a row', {}, '.74 / .84'), kind: 'disturbed', badRunLength: 3 },
  variant('habitual', HABITUAL, '.94', 150),
  variant('habitual, marks in error by 8 mm', { ...HABITUAL, markSigmaMm: MARKS_8_MM }, '.95', 150),
  variant(
    'habitual, 8 mm, 1 % wrong fixes',
    { ...HABITUAL, markSigmaMm: MARKS_8_MM, wrongFixes: ONE_PERCENT },
    '.97',
    150,
  ),
];
