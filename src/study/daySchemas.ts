import { z } from 'zod';
import { component, count, day, limits, nullable } from './schemaParts.js';

/*
 * Parts of the schema of results that tell of days and hours.
 */

export const dayModel = z.strictObject({
  component,
  medianDayPpm: limits,
  longRunPpm: limits.describe('Root-mean-square over days to come.'),
  spread: limits.describe('Of the log of the daily factors.'),
  effectiveShare: z.number(),
  events: z.array(z.strictObject({ from: day, to: day, days: z.array(day) })),
  lagOneCorrelation: nullable,
  clusteredBy: z.enum(['day', 'week']),
});

export const dailyFactor = z.strictObject({
  component,
  day,
  factor: z.number().describe("The day's ppm over that of the median day."),
  low: z.number(),
  high: z.number(),
  probabilityDegraded: z.number(),
  degraded: z.boolean().nullable(),
  occupations: count,
  secondOpinion: z.boolean().nullable(),
});

export const degradedDay = z.strictObject({
  component,
  day,
  factor: z.number(),
  probabilityDegraded: z.number(),
  occupations: count,
  verdict: z.enum([
    'bad setup',
    'one mark',
    'one crew',
    'one receiver',
    'grows with distance',
    'not explained',
  ]),
  subject: z.string().nullable(),
  text: z.string(),
});

export const timeOfDay = z.strictObject({
  component,
  pValue: nullable,
  hours: z.array(
    z.strictObject({ from: z.number(), to: z.number(), ppm: limits, occupations: count, days: count }),
  ),
  harmonics: z
    .strictObject({
      count: z.union([z.literal(1), z.literal(2)]),
      coefficients: z.array(z.number()),
      ratio: z.number(),
      highestHour: z.number(),
      pValue: z.number(),
    })
    .nullable(),
});

export const leftOut = z.strictObject({
  days: z.array(day),
  occupations: count,
  fits: z.array(
    z.strictObject({ component, constantMm: limits, ppm: limits, occupations: count, days: count }),
  ),
  rules: z
    .array(
      z.strictObject({
        component,
        limitMm: z.number(),
        share: z.number(),
        maximumBaselineKm: nullable,
        bestEstimateKm: nullable,
        reason: z.string().nullable(),
      }),
    )
    .describe('One for each of the rules, in their order.'),
});

const hour = z.number();

export const shotHours = z.strictObject({
  fromHour: hour,
  toHour: hour,
  clock: z
    .strictObject({ day, fromHour: hour, toHour: hour })
    .nullable()
    .describe("On the clock of the study's zone on its last day."),
});

export const hoursOfCaution = shotHours.extend({ component });
