import { z } from 'zod';
import { component, count, limits, nullable } from './schemaParts.js';

/*
 * Parts of the schema of results that say on what fits rest.
 */

export const terms = z.strictObject({
  component,
  terms: z.array(
    z.strictObject({
      term: z.enum(['height-difference', 'pdop', 'reported-sigma']),
      unit: z.enum(['mm per 100 m', 'power']),
      estimate: nullable,
      low: nullable,
      high: nullable,
      gain: nullable,
      se: nullable,
      verdict: z.enum(['matters', 'not shown to matter', 'cannot be told']),
    }),
  ),
  constantMm: limits,
  ppm: limits,
  ownConstantMm: limits.describe("The constant without centring and the marks' own errors."),
  knownMm: z.number(),
  occupations: count,
  days: count,
  converged: z.boolean(),
});

export const group = z.strictObject({
  by: z.enum(['crew', 'rover', 'base', 'setup']),
  component,
  reference: z.enum(['absolute', 'repeatability', 'relative']),
  groups: z.array(
    z.strictObject({
      group: z.string(),
      occupations: count,
      days: count,
      constantMm: limits,
      ppm: limits,
      reason: z.string().nullable(),
      tested: z.boolean(),
    }),
  ),
  pValue: nullable,
  verdict: z.enum(['differ', 'not shown to differ', 'too few days to tell']),
});

const rmsRatio = z.strictObject({ ratio: z.number(), low: z.number(), high: z.number(), pValue: z.number() });

export const evidence = z.strictObject({
  component,
  shares: z.array(
    z.strictObject({
      by: z.enum(['mark', 'day', 'direction', 'crew']),
      largest: z.array(z.strictObject({ group: z.string(), occupations: count, share: z.number() })),
      groups: count,
    }),
  ),
  companions: z.array(
    z.strictObject({ quantity: z.enum(['height difference', 'hour', 'date']), correlation: nullable }),
  ),
  daysWithFarShots: z
    .strictObject({
      farKm: z.number(),
      daysWithFar: count,
      daysWithoutFar: count,
      near: rmsRatio.nullable(),
    })
    .nullable(),
  firstAndLast: z.strictObject({ visits: count, days: count, first: rmsRatio.nullable() }),
});
