import { z } from 'zod';
import { SKY_MEASURES, SKY_OUTCOMES } from './skyResult.js';

const count = z.number().int().gte(0);
const nullable = z.number().nullable();

const skyDay = z.strictObject({
  day: z.string(),
  ap: nullable.describe('Mean of ap over the day.'),
  kpMax: nullable,
  hpMax: nullable.describe('Of Hp30, without it of Hp60.'),
  f107: nullable.describe('Observed, solar flux units.'),
  dstMin: nullable.describe('nT.'),
  indexShare: z.number(),
  tecMean: nullable.describe('Vertical TEC of the daytime over the site, TECU.'),
  tecMax: nullable,
  gradientMean: nullable.describe('TECU per 100 km.'),
  tecChange: nullable.describe('Mean TEC minus that of the day before, TECU.'),
  shorteningPpm: nullable.describe('Of a baseline on L1 alone, in such TEC, ppm.'),
  mapShare: z.number(),
  shareWithoutFix: nullable,
});

const dayShare = z.strictObject({ count, of: count, estimate: nullable, low: nullable, high: nullable });

const threshold = z.strictObject({
  kpFrom: z.number(),
  flaggedDays: count,
  caught: dayShare.describe('Of the degraded days those that were flagged.'),
  falseAlarms: dayShare.describe('Of the other days those that were flagged.'),
  youden: nullable,
});

const association = z.strictObject({
  outcome: z.enum(SKY_OUTCOMES),
  measure: z.enum(SKY_MEASURES),
  days: count,
  leftOut: count,
  spearman: nullable,
  low: nullable,
  high: nullable,
  pValue: nullable,
  adjustedPValue: nullable.describe('For as many comparisons as were made.'),
  blockDays: count,
  permutations: count,
  statement: z.string(),
});

/** Schema of `Sky`. */
export const skySchema = z.strictObject({
  site: z.strictObject({ base: z.string(), latitudeDeg: z.number(), longitudeDeg: z.number() }),
  files: z.array(z.string()),
  days: z.array(skyDay),
  associations: z.array(association),
  thresholds: z.array(
    z.strictObject({
      component: z.enum(['horizontal', 'vertical']),
      days: count,
      leftOut: count,
      degradedDays: count,
      thresholds: z.array(threshold),
      best: threshold.nullable(),
      pValue: nullable,
      chanceYouden: nullable,
      blockDays: count,
      statement: z.string(),
    }),
  ),
});
