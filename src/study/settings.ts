import { z } from 'zod';
import { CORRECTION_KINDS } from '../logs/index.js';
import { expectedZone, isTimeZone } from '../time/index.js';
import { coordinateKeys, coordinates, heights } from './coordinateSettings.js';
import { heightOf, layout, units } from './layoutSettings.js';
import { day, reportKeys } from './reportSettings.js';
import { columns, ruleKeys } from './ruleSettings.js';

/*
 * The study file as a schema. Descriptions become the help that editors show and the reference page, so each key says
 * what it means, its unit and its default.
 */

const share = z.number().gt(0).lt(1);
const controlFile = z.union([
  z.string().min(1),
  z.strictObject({
    file: z.string().min(1).describe('Name of the file, relative to the study file.'),
    ...coordinateKeys,
    units: units.optional(),
    heightOf: heightOf.optional(),
    columns: columns.optional(),
  }),
]);

const marksFile = z.union([
  z.string().min(1),
  z.strictObject({
    file: z.string().min(1).describe('Name of the file, relative to the study file.'),
    ...coordinateKeys,
    units: units.optional(),
    heightOf: heightOf.optional(),
    columns: columns.optional(),
    names: z
      .strictObject({
        pattern: z
          .string()
          .min(1)
          .optional()
          .describe('Regular expression whose first group is the mark, for point numbers and descriptions.'),
        aliases: z.string().min(1).optional().describe('File with the columns alias and mark.'),
      })
      .optional()
      .describe('How logs name the marks, where they do not use the names of the marks file.'),
  }),
]);

const log = z.strictObject({
  files: z
    .union([z.string().min(1), z.array(z.string().min(1)).min(1)])
    .describe('A pattern or a list of patterns, relative to the study file.'),
  layout: layout.optional(),
  ...coordinateKeys,
  corrections: z
    .enum(CORRECTION_KINDS)
    .optional()
    .describe('From where the corrections came, for rows that do not tell; only single-base is fitted.'),
  moveToPublishedBase: z
    .boolean()
    .optional()
    .describe(
      'Move positions by the base coordinates in the log minus those of the bases file; default false.',
    ),
  nearestMarkM: z
    .number()
    .positive()
    .optional()
    .describe('A position that names no known mark belongs to the nearest one within this distance, m.'),
  markTimes: z
    .string()
    .min(1)
    .optional()
    .describe('File with the columns mark, start, end (and rover): where the rover stood when.'),
});

const tolerance = z
  .strictObject({
    component: z.enum(['horizontal', 'vertical']).describe('Horizontal limits are radial.'),
    limitMm: z.number().positive().optional().describe('The tolerance, mm.'),
    limitFeet: z.number().positive().optional().describe('Instead of limitMm; one foot is 304.8 mm.'),
    share: share.default(0.95).describe("Share of a day's positions within the limit."),
    dayShare: share.default(0.9).describe('Share of days on which that must hold.'),
    confidence: z.number().gte(0.5).lt(1).default(0.95).describe('Confidence of the rule, one-sided.'),
  })
  .refine(({ limitMm, limitFeet }) => (limitMm === undefined) !== (limitFeet === undefined), {
    message: 'one of limitMm and limitFeet',
  });

const constantAndPpm = z.strictObject({
  constantMm: z.number().gte(0).describe('As stated, mm.'),
  ppm: z.number().gte(0).describe('As stated, mm per km.'),
});

const specSheet = z.strictObject({
  horizontal: constantAndPpm.describe('What it states for the plan.'),
  vertical: constantAndPpm.describe('What it states for heights.'),
  form: z
    .enum(['root-sum-square', 'linear-sum'])
    .describe('Whether the two terms are added in quadrature or as they are.'),
  axis: z.enum(['radial', 'per-axis']).describe('Whether the horizontal figure is radial or of one axis.'),
  level: z
    .enum(['rms', '68', '95'])
    .or(z.literal(68))
    .or(z.literal(95))
    .describe('What share the figures hold: rms, 68 or 95 %.'),
});

/** Patterns relative to the study file. */
const skyFiles = z.array(z.string().min(1)).default([]);

/** The schema of a study file. */
export const studySchema = z.strictObject({
  title: z.string().min(1).default('Check shots').describe('Heads every report.'),
  ...reportKeys,
  timeZone: z
    .string()
    .refine(isTimeZone, { error: ({ input }) => expectedZone(String(input)) })
    .optional()
    .describe(
      'Zone of days and of log times without an offset, an IANA name or an offset from UTC like "+02:00"; without it days are local mean solar days.',
    ),
  coordinates: coordinates.default('geographic'),
  heights: heights
    .optional()
    .describe(
      'Kind of the heights of marks, bases and logs that state none of their own; default ellipsoidal.',
    ),
  marks: marksFile.describe('File of the marks: mark and coordinates.'),
  bases: controlFile.describe('File of the bases: base, coordinates and mounting.'),
  logs: z.array(log).min(1).describe('The logs, one entry for files that are written alike.'),
  period: z
    .strictObject({
      from: day.describe('First day, such as 2025-03-01.'),
      to: day.describe('Last day, itself included.'),
    })
    .refine(({ from, to }) => from <= to, { message: 'a first day not after the last' })
    .optional()
    .describe('Days that belong to the study; without it all do.'),
  model: z
    .strictObject({
      form: z
        .enum(['root-sum-square', 'linear-sum'])
        .default('root-sum-square')
        .describe('σ² = a² + b² L², or σ = a + b L.'),
      reference: z
        .enum(['auto', 'absolute', 'repeatability', 'relative'])
        .default('auto')
        .describe(
          'What errors are counted from in the fit behind the rules; all that the data allow are reported.',
        ),
      confidence: z.number().gt(0.5).lt(1).default(0.95).describe('Level of the two-sided intervals.'),
      screen: z.boolean().default(true).describe('Look for wrong fixes and let them count less.'),
    })
    .default({ form: 'root-sum-square', reference: 'auto', confidence: 0.95, screen: true })
    .describe('How the model is fitted.'),
  occupations: z
    .strictObject({
      gapSeconds: z.number().positive().default(60).describe('A longer gap begins a new visit.'),
      windowSeconds: z
        .number()
        .positive()
        .optional()
        .describe('Cuts long static occupations into shots of this length; default no cutting.'),
    })
    .default({ gapSeconds: 60 })
    .describe('How positions become occupations.'),
  tolerances: z.array(tolerance).default([]).describe('What clients demand; each becomes a rule.'),
  specSheet: specSheet.optional().describe('The spec sheet to compare with.'),
  ...ruleKeys,
  centringSigmaMm: z
    .number()
    .gte(0)
    .default(0)
    .describe(
      'Centring of the rod, standard deviation of one axis, mm: taken out of the constant in quadrature.',
    ),
  terms: z
    .array(z.enum(['height-difference', 'pdop', 'reported-sigma']))
    .default([])
    .describe('Further terms to estimate beside constant and ppm.'),
  by: z
    .array(z.enum(['crew', 'rover', 'base']))
    .default([])
    .describe('Whether these differ in constant and ppm.'),
  indices: skyFiles.describe('Public files of Kp, Hp30, Hp60, Dst or F10.7 to compare days with.'),
  maps: skyFiles.describe('Maps of the electron content (IONEX) to compare days with.'),
  leaveOutDays: z
    .array(day)
    .default([])
    .describe('Days named here take no part in fits; the report says so.'),
  seed: z.number().int().gte(0).default(1).describe('Seed of everything random.'),
});

/** A study file as written, all defaults filled in. */
export type StudySettings = z.output<typeof studySchema>;

/** The JSON Schema of a study file, for editors. */
export function studyJsonSchema(): object {
  return {
    ...z.toJSONSchema(studySchema, { io: 'input', unrepresentable: 'any' }),
    title: 'ppmwise study file',
  };
}
