import { z } from 'zod';
import { OCCUPATION_REASONS, ROW_REASONS } from '../logs/index.js';
import { backTest, watch } from './backTestSchemas.js';
import { blunders, commonCauses, controlMarks } from './controlSchemas.js';
import {
  dailyFactor,
  dayModel,
  degradedDay,
  hoursOfCaution,
  leftOut,
  shotHours,
  timeOfDay,
} from './daySchemas.js';
import { evidence, group, terms } from './evidenceSchemas.js';
import { comparison, fit, mark, markComponent, setup, wrongFix } from './fitSchemas.js';
import { INPUT_ROLES } from './inputFiles.js';
import type { Results } from './results.js';
import { ruleOutcomes } from './ruleOutcomeSchemas.js';
import {
  checkShotLimits,
  hourRule,
  promise,
  rule,
  ruleTableRow,
  seasonRule,
  specSheetTest,
} from './ruleSchema.js';
import { count, day, form, interval, nullable } from './schemaParts.js';
import { skySchema } from './skySchema.js';
import { statedStudy } from './statedStudySchema.js';
import { job, occupationLength, secondVisit, standard } from './useSchemas.js';

const message = z.strictObject({
  code: z.string().describe('Stable name of the kind of message.'),
  severity: z.enum(['error', 'warning', 'info']),
  text: z.string(),
  file: z.string().nullable(),
  row: count.nullable().describe('Line of the file, from 1, the header included.'),
  column: z.string().nullable(),
});

const lengthClass = z.strictObject({
  fromKm: z.number(),
  toKm: z.number(),
  baselineKm: z.number(),
  occupations: count,
  days: count,
  visitsWithoutFix: count,
  horizontalRmsMm: interval.nullable(),
  verticalRmsMm: interval.nullable(),
  specSheetMm: z.strictObject({ horizontal: z.number(), vertical: z.number() }).nullable(),
  tooFew: z.boolean(),
});

const constantAndPpm = z.strictObject({ constantMm: z.number(), ppm: z.number() });

/** Schema of `results.json`; its type is {@link Results}. */
export const resultsSchema = z.strictObject({
  version: z.literal(1),
  ...statedStudy,
  messages: z.array(message),
  rows: z.strictObject({ read: count, used: count, setAside: z.partialRecord(z.enum(ROW_REASONS), count) }),
  files: z.array(
    z.strictObject({
      file: z.string(),
      sha256: z.string(),
      resolution: z.strictObject({ horizontalStepMm: z.number(), verticalStepMm: z.number() }).nullable(),
      read: count,
      used: count,
      setAside: z.partialRecord(z.enum(ROW_REASONS), z.strictObject({ count, firstRows: z.array(count) })),
    }),
  ),
  inputs: z
    .array(z.strictObject({ file: z.string(), role: z.enum(INPUT_ROLES), sha256: z.string() }))
    .describe('Files read beside the logs.'),
  roundingMm: z.strictObject({ horizontal: z.number(), vertical: z.number() }).nullable(),
  staticShots: z
    .strictObject({ occupations: count, shots: count, windowSeconds: z.number(), independent: nullable })
    .nullable(),
  visits: z.strictObject({ withFix: count, withoutFix: count }),
  occupations: z.strictObject({
    formed: count,
    used: count,
    setAside: z.partialRecord(z.enum(OCCUPATION_REASONS), count),
  }),
  heights: z.enum(['ellipsoidal', 'orthometric']).describe('Kind of the heights that were compared.'),
  commonCauses,
  blunders,
  controlMarks,
  siteMarks: z.array(z.string()).describe('Marks to which a job was fitted: residuals, not checks.'),
  days: count,
  period: z.strictObject({ from: day, to: day }).nullable(),
  bases: z.array(z.string()),
  crews: z.array(z.string()),
  rovers: z.array(z.string()),
  fits: z.array(fit),
  comparison: z.array(comparison),
  setups: z.array(setup),
  markComponents: z.array(markComponent),
  wrongFixes: z.array(wrongFix),
  terms: z.array(terms),
  groups: z.array(group),
  evidence: z.array(evidence),
  dayModels: z.array(dayModel),
  dailyFactors: z.array(dailyFactor),
  degradedDays: z.array(degradedDay),
  timeOfDay: z.array(timeOfDay),
  hoursOfCaution: z.array(hoursOfCaution),
  shotHours: shotHours.nullable().describe('Between which hours the shots were taken.'),
  lengthClasses: z.array(lengthClass),
  marks: z.array(mark),
  sky: skySchema.nullable().describe('The sky of the days and what goes with it.'),
  rules: z.array(rule),
  ...ruleOutcomes,
  ruleTable: z.array(ruleTableRow),
  promises: z.array(promise).describe('What can be promised at some lengths.'),
  rulesByHour: z.array(hourRule),
  rulesBySeason: z.array(seasonRule),
  backTest: z.array(backTest),
  specSheetTest: z.array(specSheetTest),
  checkShotLimits: z.array(checkShotLimits),
  watch: z.array(watch),
  jobs: z.array(job).describe('Points of jobs: which base reaches which.'),
  standards: z.array(standard).describe('From memory: the printed standards decide.'),
  secondVisits: z.array(secondVisit),
  errorByOccupationLength: z.array(occupationLength),
  leftOut: leftOut.nullable().describe('The days left out by the study file, and the results with them.'),
  specSheet: z
    .strictObject({
      horizontal: constantAndPpm,
      vertical: constantAndPpm,
      form,
      axis: z.enum(['radial', 'per-axis']),
      level: z.enum(['rms', '68', '95']),
    })
    .nullable(),
});

type DeepReadonly<T> = T extends object ? { readonly [K in keyof T]: DeepReadonly<T[K]> } : T;
type Same<A, B> = [A, B] extends [B, A] ? true : never;
/**
 * Schema and type say the same: this line does not compile when they part.
 * @public
 */
export const SCHEMA_IS_TYPE: Same<DeepReadonly<z.output<typeof resultsSchema>>, DeepReadonly<Results>> = true;

/** The JSON Schema of `results.json`. */
export function resultsJsonSchema(): object {
  return { ...z.toJSONSchema(resultsSchema), title: 'ppmwise results' };
}
