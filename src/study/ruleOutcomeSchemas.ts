import { z } from 'zod';
import { component, nullable } from './schemaParts.js';

const ruleMove = z.strictObject({
  component,
  limitMm: z.number(),
  share: z.number(),
  dayShare: z.number(),
  kind: z.enum([
    'as stated',
    'without a mark',
    'without a far mark',
    'without a day',
    'without a crew',
    'wrong fixes counted in',
    'other form',
    'other reference',
  ]),
  subject: z.string().nullable(),
  maximumBaselineKm: nullable,
  reason: z.string().nullable(),
});

const constantAndPpm = z.strictObject({ constantMm: nullable, ppm: nullable });

const adjustmentWeight = z.strictObject({
  component,
  form: z.enum(['root-sum-square', 'linear-sum']),
  markError: z.boolean().describe("The errors of the marks' coordinates are in the constant."),
  centring: z.boolean().describe('The setting of the rod over the mark is in the constant.'),
  perAxis: constantAndPpm.describe('One standard deviation of east, north or height.'),
  radialRms: constantAndPpm.nullable(),
  share95: constantAndPpm.describe('What holds 95 % of Gaussian errors.'),
});

/** Schemas of what follows from fits and rules. */
export const ruleOutcomes = {
  ruleMoves: z.array(ruleMove).describe('The rules found again with one thing changed.'),
  adjustmentWeights: z.array(adjustmentWeight),
};
