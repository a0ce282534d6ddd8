import { z } from 'zod';
import { OCCUPATION_REASONS, ROW_REASONS } from '../logs/index.js';
import { blunders, commonCauses, controlMarks } from './controlSchemas.js';
import type { Results } from './results.js';

const component = z.enum(['horizontal', 'vertical']);
const form = z.enum(['root-sum-square', 'linear-sum']);
const count = z.number().int().gte(0);
const nullable = z.number().nullable();
const limits = z.strictObject({ estimate: nullable, low: nullable, high: nullable });
const interval = z.strictObject({ estimate: z.number(), low: nullable, high: nullable });
const day = z.string();
const axes = z.strictObject({ east: nullable, north: nullable, up: nullable });

const message = z.strictObject({
  code: z.string().describe('Stable name of the kind of message.'),
  severity: z.enum(['error', 'warning', 'info']),
  text: z.string(),
  file: z.string().nullable(),
  row: count.nullable().describe('Line of the file, from 1, the header included.'),
  column: z.string().nullable(),
});

const signedPpm = z.strictObject({
  ppm: z.number(),
  low: z.number(),
  high: z.number(),
  pValue: z.number(),
  degreesOfFreedom: count,
  significant: z.boolean(),
});

const fit = z.strictObject({
  component,
  reference: z.enum(['absolute', 'repeatability', 'relative']),
  composed: z.boolean(),
  form,
  screened: z.boolean(),
  basisOfRule: z.boolean().describe('The rules of this component rest on this fit.'),
  basis: z.enum(['radial RMS', 'vertical RMS']),
  confidence: z.number(),
  constantMm: limits,
  ppm: limits.describe('Root-mean-square over the days observed, mm per km.'),
  ppmIfIndependent: limits.describe('If every shot were independent: too narrow.'),
  interval: z.string(),
  medianDayPpm: limits
    .nullable()
    .describe('Of which half of the days are worse; null where days cannot be judged.'),
  wrongFixShare: z
    .strictObject({
      events: count,
      estimate: z.number(),
      low: z.number(),
      high: z.number(),
      atKm: z.array(z.strictObject({ baselineKm: z.number(), estimate: z.number(), high: z.number() })),
    })
    .nullable(),
  signedPpm: signedPpm.nullable().describe("Signed growth of the marks' mean errors: no part of the ppm."),
  informationNumber: z.number(),
  occupations: count,
  days: count,
  marks: count.nullable(),
  shortestKm: z.number(),
  longestKm: z.number(),
  mostInfluentialDay: z.strictObject({ day, ppmWithout: z.number() }).nullable(),
  notes: z.array(z.string()),
});

const dayModel = z.strictObject({
  component,
  medianDayPpm: limits,
  longRunPpm: limits.describe('Root-mean-square over days to come.'),
  spread: limits.describe('Of the log of the daily factors.'),
  effectiveShare: z.number(),
  events: z.array(z.strictObject({ from: day, to: day, days: z.array(day) })),
  lagOneCorrelation: nullable,
  clusteredBy: z.enum(['day', 'week']),
});

const dailyFactor = z.strictObject({
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

const degradedDay = z.strictObject({
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

const timeOfDay = z.strictObject({
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

const lengthClass = z.strictObject({
  fromKm: z.number(),
  toKm: z.number(),
  baselineKm: z.number(),
  occupations: count,
  days: count,
  visitsWithoutFix: count,
  horizontalRmsMm: interval.nullable(),
  verticalRmsMm: interval.nullable(),
  tooFew: z.boolean(),
});

const mark = z.strictObject({
  mark: z.string(),
  base: z.string(),
  baselineKm: z.number(),
  azimuthDeg: z.number(),
  occupations: count,
  days: count,
  east: nullable,
  north: nullable,
  up: nullable,
  se: axes,
  standsOut: z.strictObject({ horizontal: z.boolean(), vertical: z.boolean() }),
});

const comparison = z.strictObject({
  component,
  against: z.literal('linear-sum'),
  gain: nullable.describe('Log score per shot that root-sum-square gains on unseen days.'),
  se: nullable,
  days: count,
  verdict: z.enum(['root-sum-square', 'linear-sum', 'cannot be told apart']),
});

const setup = z.strictObject({
  setup: z.string(),
  visits: count,
  east: nullable,
  north: nullable,
  up: nullable,
  se: axes,
  separable: z.boolean(),
  reason: z.string().nullable(),
});

const markComponent = z.strictObject({
  component,
  marks: count,
  standing: z.enum(['given', 'indicative', 'too few marks']),
  sigmaMm: limits.describe("Spread of the marks' own errors per axis."),
  signedPpm: signedPpm.nullable(),
  differPValue: nullable,
  anyPValue: nullable,
  spreadMm: nullable,
  standOut: z.array(z.string()),
});

const wrongFix = z.strictObject({
  day,
  mark: z.string(),
  rover: z.string(),
  crew: z.string(),
  baselineKm: z.number(),
  east: nullable,
  north: nullable,
  up: nullable,
  probability: z.number(),
  file: z.string(),
  row: count,
});

const rule = z.strictObject({
  component,
  limitMm: z.number(),
  share: z.number(),
  dayShare: z.number(),
  confidence: z.number(),
  method: z.literal('pooled'),
  maximumBaselineKm: nullable.describe('Lower confidence limit; 0 or null with a reason.'),
  bestEstimateKm: nullable,
  allDaysKm: nullable,
  longestSupportedKm: nullable,
  reason: z.string().nullable(),
  conditions: z.strictObject({
    occupations: count,
    days: count,
    from: day,
    to: day,
    marks: z.array(z.string()),
    bases: z.array(z.string()),
  }),
});

const constantAndPpm = z.strictObject({ constantMm: z.number(), ppm: z.number() });

/** Schema of `results.json`; its type is {@link Results}. */
export const resultsSchema = z.strictObject({
  version: z.literal(1),
  study: z.strictObject({ title: z.string(), timeZone: z.string().nullable(), seed: z.number() }),
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
  fits: z.array(fit),
  comparison: z.array(comparison),
  setups: z.array(setup),
  markComponents: z.array(markComponent),
  wrongFixes: z.array(wrongFix),
  dayModels: z.array(dayModel),
  dailyFactors: z.array(dailyFactor),
  degradedDays: z.array(degradedDay),
  timeOfDay: z.array(timeOfDay),
  lengthClasses: z.array(lengthClass),
  marks: z.array(mark),
  rules: z.array(rule),
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
/** Schema and type say the same: this line does not compile when they part. */
export const SCHEMA_IS_TYPE: Same<DeepReadonly<z.output<typeof resultsSchema>>, DeepReadonly<Results>> = true;

/** The JSON Schema of `results.json`. */
export function resultsJsonSchema(): object {
  return { ...z.toJSONSchema(resultsSchema), title: 'ppmwise results' };
}
