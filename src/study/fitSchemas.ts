import { z } from 'zod';
import { axes, component, count, day, form, limits, nullable } from './schemaParts.js';

/*
 * Parts of the schema of results that say what was fitted.
 */

const signedPpm = z.strictObject({
  ppm: z.number(),
  low: z.number(),
  high: z.number(),
  pValue: z.number(),
  degreesOfFreedom: count,
  significant: z.boolean(),
});

export const fit = z.strictObject({
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

export const mark = z.strictObject({
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

export const comparison = z.strictObject({
  component,
  against: z.literal('linear-sum'),
  gain: nullable.describe('Log score per shot that root-sum-square gains on unseen days.'),
  se: nullable,
  days: count,
  verdict: z.enum(['root-sum-square', 'linear-sum', 'cannot be told apart']),
});

export const setup = z.strictObject({
  setup: z.string(),
  visits: count,
  east: nullable,
  north: nullable,
  up: nullable,
  se: axes,
  separable: z.boolean(),
  reason: z.string().nullable(),
});

export const markComponent = z.strictObject({
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

export const wrongFix = z.strictObject({
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
