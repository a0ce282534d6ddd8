import { z } from 'zod';
import { component, nullable } from './schemaParts.js';

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
