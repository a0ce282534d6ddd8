import { z } from 'zod';

/*
 * Keys of the study file that say what coordinates are: the same for logs, marks and bases.
 */

export const coordinates = z
  .string()
  .min(1)
  .describe(
    '`geographic` (degrees, WGS 84), `geocentric` (metres), a code like `EPSG:25832`, or a proj string of a projection.',
  );

export const heights = z
  .strictObject({
    kind: z
      .enum(['ellipsoidal', 'orthometric'])
      .describe('Above the ellipsoid, or above the geoid (sea level).'),
    geoid: z
      .enum(['column', 'constant', 'grid'])
      .optional()
      .describe('Where geoid separations come from: column geoidSeparation, separationM, or file.'),
    separationM: z
      .number()
      .gt(-200)
      .lt(200)
      .optional()
      .describe('Geoid above the ellipsoid, m; with geoid: constant.'),
    file: z.string().min(1).optional().describe('Grid file of separations; with geoid: grid.'),
  })
  .refine(({ geoid, separationM }) => (geoid === 'constant') === (separationM !== undefined), {
    message: 'separationM together with geoid: constant',
  })
  .refine(({ geoid, file }) => (geoid === 'grid') === (file !== undefined), {
    message: 'file together with geoid: grid',
  })
  .describe('Kind of the heights, and the way to the other kind.');

const triple = z.tuple([z.number(), z.number(), z.number()]);
const helmert = {
  shiftM: triple.optional().describe('Along the geocentric axes x, y, z, m.'),
  shiftMm: triple.optional().describe('The same in mm.'),
  rotationArcSeconds: triple.optional().describe('About the geocentric axes; needs `convention`.'),
  rotationMas: triple.optional().describe('The same in thousandths of an arc second.'),
  scalePpm: z.number().optional().describe('Positive makes lengths longer.'),
  scalePpb: z.number().optional().describe('The same in parts per billion.'),
};

export const transformation = z
  .strictObject({
    ...helmert,
    convention: z
      .enum(['position-vector', 'coordinate-frame'])
      .optional()
      .describe('Which way rotations are counted.'),
    rotation: z
      .enum(['exact', 'small-angle'])
      .optional()
      .describe('Rotation matrix, or the approximation of the EPSG methods; default exact.'),
    rates: z.strictObject(helmert).optional().describe('Changes a year: 14 parameters.'),
    referenceYear: z.number().optional().describe('Decimal year of the parameters; with rates.'),
    epoch: z.number().optional().describe('Decimal year of the coordinates; with rates.'),
    backwards: z
      .boolean()
      .optional()
      .describe('The parameters lead from the frame of the study to this one.'),
  })
  .describe('From the frame of these coordinates to the frame of the study, in geocentric coordinates.');

export const groundGrid = z
  .strictObject({
    factor: z.number().positive().describe('Ground length over grid length, such as 1.000158.'),
    aboutEastingM: z
      .number()
      .optional()
      .describe('The point that scaling leaves where it is; default the origin.'),
    aboutNorthingM: z.number().optional().describe('The same for northings.'),
    shiftEastingM: z
      .number()
      .optional()
      .describe('Added after scaling, such as -400000 to cut coordinates short.'),
    shiftNorthingM: z.number().optional().describe('The same for northings.'),
  })
  .describe('Ground coordinates of a job, to be turned back to those of the projection.');

export const sitePlane = z
  .strictObject({
    aboutEastingM: z.number().optional().describe('Pivot of rotation, scale and tilts; default the origin.'),
    aboutNorthingM: z.number().optional().describe('The same for northings.'),
    shiftEastingM: z.number().optional().describe('Added to eastings, m.'),
    shiftNorthingM: z.number().optional().describe('Added to northings, m.'),
    rotationArcSeconds: z.number().optional().describe('Clockwise.'),
    scalePpm: z.number().optional().describe('Positive makes lengths longer.'),
    heightShiftM: z.number().optional().describe('Added to heights, m.'),
    tiltEastMmPerKm: z.number().optional().describe('Rise of the plane toward east.'),
    tiltNorthMmPerKm: z.number().optional().describe('Rise of the plane toward north.'),
    marks: z
      .array(z.string().min(1))
      .optional()
      .describe('Marks to which the job was fitted: their errors are residuals, not checks.'),
  })
  .describe('Transformation of a job from the projection to its own plane, to be undone.');

/** Keys that logs, marks and bases share. */
export const coordinateKeys = {
  coordinates: coordinates.optional(),
  heights: heights.optional(),
  transformation: transformation.optional(),
  groundGrid: groundGrid.optional(),
  sitePlane: sitePlane.optional(),
  frame: z.string().min(1).optional().describe('Name of the reference frame, where the rows state none.'),
  epoch: z.number().optional().describe('Decimal year of the coordinates, where the rows state none.'),
};

export type HeightSettings = z.output<typeof heights>;
export type TransformationSettings = z.output<typeof transformation>;
export type GroundGridSettings = z.output<typeof groundGrid>;
export type SitePlaneSettings = z.output<typeof sitePlane>;
