import { z } from 'zod';
import { component, count, day, nullable } from './schemaParts.js';

const seenRange = z.strictObject({ from: z.number(), to: z.number() });

/** One rule, as the results hold it. */
export const rule = z.strictObject({
  component,
  limitMm: z.number(),
  share: z.number(),
  dayShare: z.number(),
  confidence: z.number(),
  method: z.enum(['day-model', 'pooled']),
  maximumBaselineKm: nullable.describe('Lower confidence limit; 0 or null with a reason.'),
  bestEstimateKm: nullable,
  allDaysKm: nullable,
  longestSupportedKm: nullable,
  wrongFixShare: nullable.describe('Share of wrong fixes reckoned with at the maximum baseline.'),
  dayBound: z
    .strictObject({ days: count, daysNeeded: count, baselineKm: nullable, sentence: z.string() })
    .nullable(),
  reason: z.string().nullable(),
  remarks: z.array(z.string()),
  conditions: z.strictObject({
    occupations: count,
    days: count,
    from: day,
    to: day,
    marks: z.array(z.string()),
    bases: z.array(z.string()),
    epochs: seenRange.nullable(),
    solarHours: seenRange.nullable(),
    supports: z.array(z.string()),
    tiltDeg: seenRange.nullable(),
    skies: z.array(z.string()),
    visitsWithFix: nullable,
    f107: seenRange.nullable(),
    baseSigmaMm: nullable,
    heightDifferenceM: nullable,
    reviewBy: day.nullable(),
  }),
});
