import { z } from 'zod';
import { REPORT_UNITS } from './readerUnits.js';
import { day, nullable } from './schemaParts.js';

/** Schema of what made a result, and of what the study file said. */
export const statedStudy = {
  software: z.string().describe('Version of ppmwise.'),
  study: z.strictObject({
    title: z.string(),
    timeZone: z.string().nullable(),
    seed: z.number(),
    surveyor: z.string().nullable(),
    reportDate: day.nullable(),
    reportUnits: z.enum(REPORT_UNITS).describe('Units of the pages; here all is metric.'),
    showCrews: z.boolean(),
  }),
  settings: z.strictObject({
    form: z.enum(['root-sum-square', 'linear-sum']),
    reference: z.enum(['auto', 'absolute', 'repeatability', 'relative']),
    confidence: z.number(),
    screen: z.boolean(),
    gapSeconds: z.number(),
    windowSeconds: nullable,
    period: z.strictObject({ from: day, to: day }).nullable(),
    leaveOutDays: z.array(day),
    centringSigmaMm: z.number(),
    stated: z
      .array(z.strictObject({ key: z.string(), value: z.string() }))
      .describe('Every setting, defaults filled in.'),
  }),
};
