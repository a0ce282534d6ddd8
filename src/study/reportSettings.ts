import { z } from 'zod';
import { parseIsoTime } from '../time/index.js';
import { REPORT_UNITS } from './readerUnits.js';

/** A calendar day. */
export const day = z
  .string()
  .regex(/^\d{4}-\d{2}-\d{2}$/, { message: 'a day like 2025-03-01', abort: true })
  .refine((text) => parseIsoTime(text).kind === 'date', { message: 'a day that exists' });

/** Keys of the study file that say how pages are written. */
export const reportKeys = {
  surveyor: z.string().min(1).optional().describe('The surveyor who answers for the report.'),
  reportDate: day.optional().describe('Day of the report, which ppmwise does not take from a clock.'),
  reportUnits: z
    .enum(REPORT_UNITS)
    .default('metric')
    .describe('Units of pages and charts; results.json and tables stay metric.'),
  showCrews: z.boolean().default(false).describe('Name crews on pages; default false, which numbers them.'),
};
