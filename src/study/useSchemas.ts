import { z } from 'zod';
import { component, count, interval, limits, nullable } from './schemaParts.js';

const place = { latitudeDeg: z.number(), longitudeDeg: z.number(), heightM: nullable };

/** The points of a job under one tolerance, as the results hold them. */
export const job = z.strictObject({
  file: z.string(),
  component,
  limitMm: z.number(),
  share: z.number(),
  dayShare: z.number(),
  confidence: z.number(),
  maximumBaselineKm: nullable,
  reason: z.string().nullable(),
  bases: z.array(
    z.strictObject({
      base: z.string(),
      ...place,
      maximumBaselineKm: nullable.describe('Shorter from a base whose coordinates are known worse.'),
      reason: z.string().nullable(),
      baseOfRule: z.boolean(),
    }),
  ),
  points: z.array(
    z.strictObject({
      point: z.string(),
      ...place,
      bestBase: z.string(),
      baselineKm: z.number(),
      promisedMm: nullable.describe('What can be promised there, from the best base.'),
      reason: z.string().nullable(),
      reachedFrom: z.array(z.string()),
      needsAnotherBase: z.boolean(),
    }),
  ),
  reaches: z.array(
    z.strictObject({
      point: z.string(),
      base: z.string(),
      baselineKm: z.number(),
      heightDifferenceM: nullable,
      holds: z.boolean().nullable(),
      promisedMm: nullable,
      reason: z.string().nullable(),
    }),
  ),
  sentence: z.string(),
});

/** A standard with its conditions checked. */
export const standard = z.strictObject({
  name: z.string(),
  standard: z.string(),
  definition: z.string(),
  conditions: z.array(
    z.strictObject({ text: z.string(), met: z.boolean().nullable().describe('null: the data do not tell.') }),
  ),
  caution: z.string(),
  figures: z.array(
    z.strictObject({
      what: z.string(),
      component: component.nullable(),
      baselineKm: nullable,
      valueMm: nullable,
      lowMm: nullable,
      highMm: nullable,
      allowedMm: nullable.describe('What the standard allows; null where it only defines.'),
      verdict: z.enum(['holds', 'exceeded', 'cannot be told']).nullable(),
    }),
  ),
  lacking: z.array(z.string()),
  outcome: z.string(),
});

/** What a second visit on the same day gains. */
export const secondVisit = z.strictObject({
  component,
  pairs: count,
  farPairs: count,
  days: count,
  correlation: z
    .strictObject({
      A: z.number(),
      B: z.number(),
      nearStrength: z.number(),
      nearMinutes: z.number(),
      farStrength: z.number(),
      farMinutes: z.number(),
    })
    .nullable(),
  sentence: z.string(),
  alarmShare: z.number(),
  visits: z.array(
    z.strictObject({
      baselineKm: z.number(),
      minutes: z.number(),
      factor: limits.describe('Error of the mean of both over that of one.'),
      differenceFactor: limits.describe('Error of their difference over that of one.'),
      differenceLimitMm: nullable.describe('How far both may lie apart.'),
    }),
  ),
});

/** Errors by the number of epochs behind an occupation. */
export const occupationLength = z.strictObject({
  component,
  fromEpochs: count,
  toEpochs: count.nullable(),
  occupations: count,
  days: count,
  ratio: interval.describe('RMS of error over the fitted spread.'),
});
