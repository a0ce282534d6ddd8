import { z } from 'zod';
import { component, count, day, nullable } from './schemaParts.js';

/*
 * Parts of the schema of results that prove rules on days not seen, and that new days are watched by.
 */

const reference = z.enum(['absolute', 'repeatability', 'relative']);
const observed = { observedShare: z.number(), low: nullable, high: nullable };

const scoreKeys = {
  ...observed,
  occupations: count,
  shareWithSuspects: z.number().describe('Suspected wrong fixes counted in full.'),
  days: count,
  goodDays: count.describe('Days on which at least the share lay inside.'),
  goodDayShare: z.number(),
  logScore: nullable,
  pinballMm: z.number(),
  lengthClasses: z.array(
    z.strictObject({ ...observed, fromKm: z.number(), toKm: nullable, occupations: count, days: count }),
  ),
};
const score = z.strictObject(scoreKeys);

const ruleCount = z.strictObject({
  limitMm: z.number(),
  share: z.number(),
  dayShare: z.number(),
  confidence: z.number(),
  lengthKm: z.strictObject({ from: z.number(), to: z.number() }).nullable(),
  shots: count,
  held: count,
  days: count,
  goodDays: count,
  goodDayShareLow: nullable,
  failures: z.array(
    z.strictObject({
      day,
      mark: z.string(),
      base: z.string(),
      crew: z.string(),
      rover: z.string(),
      baselineKm: z.number(),
      errorMm: z.number(),
      suspected: z.boolean(),
    }),
  ),
  sentence: z.string(),
});

export const backTest = z.strictObject({
  component,
  reference,
  share: z.number(),
  ...scoreKeys,
  predictive: score.nullable(),
  specSheet: score.nullable(),
  rules: z.array(ruleCount),
  specSheetRules: z.array(ruleCount),
  forward: z.strictObject({
    component,
    share: z.number(),
    fittedTo: day.nullable(),
    judgedFrom: day.nullable(),
    judgedTo: day.nullable(),
    daysFitted: count,
    own: score.nullable(),
    rules: z.array(ruleCount),
    onNewMarks: count,
    reason: z.string().nullable(),
  }),
  groups: z.array(
    z.strictObject({
      by: z.enum(['crew', 'rover', 'base']),
      group: z.string(),
      occupations: count,
      score: score.nullable(),
      reason: z.string().nullable(),
    }),
  ),
});

const watchBasis = z.strictObject({
  component,
  reference,
  days: count,
  lastDay: day,
  reviewBy: day.nullable(),
  A: z.number(),
  B: z.number(),
  effectiveShare: z.number(),
  logFactors: z.array(z.number()),
  probabilities: z.array(z.number()),
  marks: z
    .array(
      z.strictObject({
        mark: z.string(),
        meanMm: z.array(z.number()),
        days: count,
        share: z.number(),
      }),
    )
    .nullable(),
});

export const watch = z.union([
  z.strictObject({ component, basis: watchBasis, reason: z.null() }),
  z.strictObject({ component, basis: z.null(), reason: z.string() }),
]);
