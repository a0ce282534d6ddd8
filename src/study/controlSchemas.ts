import { z } from 'zod';
import { count, day, nullable } from './schemaParts.js';

/*
 * Parts of the schema of results that say what is compared with what.
 */

const commonParameter = z.strictObject({
  name: z.enum(['shift-east', 'shift-north', 'shift-up', 'scale', 'rotation', 'tilt-east', 'tilt-north']),
  unit: z.enum(['mm', 'ppm', 'arcsec', 'mm/km']),
  estimate: z.number(),
  standardError: nullable,
  degreesOfFreedom: count,
});

export const commonCauses = z.strictObject({
  bases: z.array(
    z.strictObject({ base: z.string(), marks: count, days: count, parameters: z.array(commonParameter) }),
  ),
  causes: z.array(z.strictObject({ code: z.string(), text: z.string(), remedy: z.string() })),
});

export const blunders = z.array(
  z.strictObject({
    mark: z.string(),
    day,
    crew: z.string(),
    rover: z.string(),
    cause: z.string(),
    file: z.string(),
    row: count,
  }),
);

export const controlMarks = z.array(
  z.strictObject({
    mark: z.string(),
    from: day.nullable(),
    to: day.nullable(),
    source: z.string().nullable(),
    frame: z.string().nullable(),
    epoch: nullable.describe('Decimal year.'),
    horizontalSigmaMm: nullable.describe('One standard deviation, per axis.'),
    verticalSigmaMm: nullable,
    sky: z.enum(['open', 'partly', 'obstructed']).nullable(),
    siteMark: z.boolean().describe('The job was fitted to it: residuals, not checks.'),
    combinedFactor: nullable.describe('Grid over ground, of the first projected system.'),
  }),
);
