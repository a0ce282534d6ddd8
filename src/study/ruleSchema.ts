import { z } from 'zod';
import { component, count, day, form, nullable } from './schemaParts.js';

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
    basePpm: nullable.describe('Of a base on an assumed coordinate; taken off the limit.'),
    heightDifferenceM: nullable,
    reviewBy: day.nullable(),
  }),
});

const tableKeys = {
  component,
  limitMm: z.number(),
  share: z.number(),
  maximumBaselineKm: nullable,
  bestEstimateKm: nullable,
  reason: z.string().nullable(),
};

export const ruleTableRow = z.strictObject({
  ...tableKeys,
  dayShare: z.number(),
  confidence: z.number(),
  method: z.enum(['day-model', 'pooled']),
  allDaysKm: nullable,
});

export const promise = z.strictObject({
  component,
  baselineKm: z.number(),
  share: z.number(),
  dayShare: z.number(),
  confidence: z.number(),
  method: z.enum(['day-model', 'pooled']).describe('As of rules.'),
  limitMm: nullable.describe('Upper confidence limit; null with a reason.'),
  bestEstimateMm: nullable.describe('The same at one half instead of the confidence.'),
  reason: z.string().nullable(),
});

export const hourRule = z.strictObject({ ...tableKeys, hours: z.string().describe('Solar time.') });
export const seasonRule = z.strictObject({ ...tableKeys, month: z.string() });

const reference = z.enum(['absolute', 'repeatability', 'relative']);

export const specSheetTest = z.strictObject({
  component,
  reference,
  constantMm: z.number(),
  ppm: z.number(),
  form,
  ratios: z.array(
    z.strictObject({
      baselineKm: z.number(),
      ratio: z.number().describe("The own spread over the sheet's."),
      low: z.number(),
      high: z.number(),
      verdict: z.enum(['worse', 'better', 'not worse by more than 10 %', 'not shown to differ']),
    }),
  ),
  verdict: z.enum([
    'worse',
    'better',
    'not worse by more than 10 %',
    'not shown to differ',
    'cannot be judged',
  ]),
  sentence: z.string(),
});

export const checkShotLimits = z.strictObject({
  component,
  alarmShare: z.number(),
  falseAlarmsPerYear: z.number(),
  checksPerYear: z.number(),
  limits: z.array(
    z.strictObject({
      baselineKm: z.number(),
      knownMarkMm: z.number(),
      otherDayMm: z.number(),
      twoBasesMm: z.number(),
    }),
  ),
  twoBases: z.array(
    z.strictObject({
      firstKm: z.number().describe('Distance from the first base.'),
      secondKm: z.number().describe('Distance from the second base.'),
      limitMm: z.number().describe('How far both shots may lie apart.'),
    }),
  ),
  reason: z.string().nullable(),
  sentence: z.string(),
});
