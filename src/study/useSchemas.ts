import { z } from 'zod';
import { component, count, interval, limits, nullable } from './schemaParts.js';

const place = {
  latitudeDeg: z.number().describe('As the study compares coordinates.'),
  longitudeDeg: z.number().describe('The same.'),
  heightM: nullable.describe('null where it is not known.'),
};

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
      point: z.string().describe('Name of the point.'),
      ...place,
      bestBase: z.string().describe('The base from which most can be promised.'),
      baselineKm: z.number(),
      promisedMm: nullable.describe('What can be promised there, from the best base.'),
      reason: z.string().nullable(),
      reachedFrom: z.array(z.string()),
      needsAnotherBase: z
        .boolean()
        .nullable()
        .describe('The rule reaches it from no base; null without a rule.'),
    }),
  ),
  reaches: z.array(
    z.strictObject({
      point: z.string().describe('Name of the point.'),
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
  standard: z.string().describe('Its published name.'),
  definition: z.string().describe('What it defines, in words.'),
  conditions: z.array(
    z.strictObject({ text: z.string(), met: z.boolean().nullable().describe('null: the data do not tell.') }),
  ),
  caution: z.string(),
  figures: z.array(
    z.strictObject({
      what: z.string().describe('What the figure is of.'),
      component: component.nullable(),
      baselineKm: nullable,
      valueMm: nullable.describe('null where the data give none.'),
      lowMm: nullable.describe('One-sided 95 % limit of the value; null where it is not known.'),
      highMm: nullable.describe('The same, above.'),
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
  pairs: count.describe('Pairs of visits of one mark on one day.'),
  farPairs: count,
  days: count,
  correlation: z
    .strictObject({
      A: z.number().describe('Square of the constant, mm².'),
      B: z.number().describe('Square of the ppm.'),
      nearStrength: z.number().describe('Correlation of the constant parts of two visits at once.'),
      nearMinutes: z.number().describe('Time in which it falls to 37 %.'),
      farStrength: z.number().describe('Correlation of the distance parts of two visits at once.'),
      farMinutes: z.number().describe('Time in which it falls to 37 %.'),
    })
    .nullable(),
  sentence: z.string(),
  alarmShare: z.number(),
  visits: z.array(
    z.strictObject({
      baselineKm: z.number(),
      minutes: z.number().describe('Time between the two visits.'),
      factor: limits.describe('Error of the mean of both over that of one.'),
      differenceFactor: limits.describe('Error of their difference over that of one.'),
      differenceLimitMm: nullable.describe('How far both may lie apart.'),
    }),
  ),
});

/** Errors by the number of epochs behind an occupation. */
export const occupationLength = z.strictObject({
  component,
  fromEpochs: count.describe('Fixed positions averaged to an occupation.'),
  toEpochs: count.nullable().describe('Itself included; null: and more.'),
  occupations: count,
  days: count,
  ratio: interval.describe('RMS of error over the fitted spread.'),
});
