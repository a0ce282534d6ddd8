import { z } from 'zod';
import { COLUMN_ROLES } from '../logs/index.js';
import { coordinateKeys } from './coordinateSettings.js';
import { units } from './layoutSettings.js';
import { day } from './reportSettings.js';

/*
 * Keys of the study file that say for what rules are used: the points of jobs, a site high above its base, standards.
 */

/** Names of standards, as the study file and the results have them. */
export const STANDARDS = ['NSSDA', 'ASPRS', 'ISO 17123-8', 'GUM', 'land-title'] as const;
export type StandardName = (typeof STANDARDS)[number];

export const columns = z
  .partialRecord(z.enum(COLUMN_ROLES), z.string().min(1))
  .describe('Role → header, where the file does not spell the role itself.');

const job = z.union([
  z.string().min(1),
  z
    .strictObject({
      file: z.string().min(1).describe('Name of the file, relative to the study file.'),
      ...coordinateKeys,
      units: units.optional(),
      columns: columns.optional(),
      limitMm: z
        .number()
        .positive()
        .optional()
        .describe('Horizontal limit of this job, mm, instead of the tolerances of the study.'),
      limitFeet: z.number().positive().optional().describe('Instead of limitMm; one foot is 304.8 mm.'),
    })
    .refine(({ limitMm, limitFeet }) => limitMm === undefined || limitFeet === undefined, {
      message: 'one of limitMm and limitFeet, or neither',
    }),
]);

const fieldTest = z.strictObject({
  marks: z
    .tuple([z.string().min(1), z.string().min(1)])
    .describe('Both rover points, in the order in which each set measures them.'),
  day: day.describe('Day of the first series.'),
  distanceM: z
    .number()
    .positive()
    .optional()
    .describe('Horizontal distance of the points, known by other means, m; default from the marks file.'),
  heightDifferenceM: z
    .number()
    .optional()
    .describe('Height of the second point over the first, m; default from the marks file.'),
  planMm: z
    .number()
    .positive()
    .optional()
    .describe('Standard deviation of the plan known beforehand, √(s_x² + s_y²), mm; default the spec sheet.'),
  heightMm: z.number().positive().optional().describe('The same of the height.'),
});

/** Keys for what follows from the rules. */
export const ruleKeys = {
  site: z
    .strictObject({ heightDifferenceM: z.number().describe('Site minus base, m.') })
    .optional()
    .describe(
      'A site far above or below its base: the vertical rules are for it. Needs the term height-difference.',
    ),
  jobs: z
    .array(job)
    .default([])
    .describe('Files of job points (point, coordinates, limitMm where wanted): which base reaches which.'),
  checkShots: z
    .strictObject({
      falseAlarmsPerYear: z
        .number()
        .positive()
        .default(1)
        .describe('False alarms that a crew accepts in a year; default 1.'),
      checksPerYear: z
        .number()
        .positive()
        .default(1000)
        .describe('Check shots of a crew in a year; default 1000.'),
    })
    .refine(({ falseAlarmsPerYear, checksPerYear }) => falseAlarmsPerYear < checksPerYear, {
      message: 'fewer false alarms than check shots',
    })
    .default({ falseAlarmsPerYear: 1, checksPerYear: 1000 })
    .describe('How often limits of check shots may alarm for nothing.'),
  standards: z
    .array(z.enum(STANDARDS))
    .default([])
    .describe('Standards to compare with, each with its conditions checked.'),
  fieldTests: z
    .array(fieldTest)
    .default([])
    .describe('Field tests after ISO 17123-8 among the shots, where they are not to be recognised.'),
};

export type JobSettings = z.output<typeof job>;
export type FieldTestSettings = z.output<typeof fieldTest>;
