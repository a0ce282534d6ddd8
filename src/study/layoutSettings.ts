import { z } from 'zod';
import { COLUMN_ROLES, CORRECTION_KINDS, ENCODINGS } from '../logs/index.js';
import { coordinates } from './coordinateSettings.js';

/*
 * Keys of the study file that say how a log is written.
 */

const lengthUnit = z.enum(['metre', 'international-foot', 'us-survey-foot']);
export const units = z
  .union([
    lengthUnit,
    z.strictObject({
      length: lengthUnit.optional().describe('Of plane coordinates.'),
      height: lengthUnit.optional().describe('Of heights; default that of plane coordinates.'),
      angle: z
        .enum(['degrees', 'dms'])
        .optional()
        .describe('Degrees, or degrees, minutes and seconds; default degrees.'),
    }),
  ])
  .describe(
    'Unit of all lengths, or of plane, heights and angles apart; default that of the coordinates, degrees.',
  );
export const heightOf = z.enum(['mark', 'antenna']).describe('What the heights are those of; default mark.');

const valuesOutsideColumns = {
  constants: z
    .partialRecord(z.enum(COLUMN_ROLES), z.union([z.string(), z.number()]).transform(String))
    .optional()
    .describe('Role → value, where the file has no such column or the cell is blank.'),
  fromFileName: z
    .string()
    .min(1)
    .optional()
    .describe('Regular expression whose named groups are roles, matched against the name of the file.'),
};

const delimitedLayout = z.strictObject({
  kind: z.literal('delimited').describe('Delimited text.'),
  delimiter: z
    .string()
    .min(1)
    .optional()
    .describe('`comma`, `semicolon`, `tab`, `pipe`, `blanks` or the character; without it the file decides.'),
  decimal: z.string().min(1).optional().describe('`point`, `comma` or the character; default point.'),
  header: z.boolean().optional().describe('Whether the first line names the columns; default true.'),
  skipLines: z.number().int().gte(0).optional().describe('Lines at the top to pass over; default 0.'),
  comment: z.string().min(1).optional().describe('Lines that begin with this are passed over; default `#`.'),
  encoding: z.enum(ENCODINGS).optional().describe('Without it the first bytes decide.'),
  columns: z
    .partialRecord(z.enum(COLUMN_ROLES), z.union([z.string().min(1), z.number().int().gte(1)]))
    .optional()
    .describe('Role → header, or number of the column from 1.'),
  units: units.optional(),
  coordinates: coordinates.optional(),
  heightOf: heightOf.optional(),
  time: z
    .strictObject({
      format: z
        .string()
        .min(1)
        .optional()
        .describe('Tokens `yyyy MM dd HH hh mm ss SSS a`, `day-of-year` or `excel`; default ISO 8601.'),
      zone: z
        .union([z.string().min(1), z.number()])
        .transform(String)
        .optional()
        .describe('IANA zone, `UTC` or an offset like "+02:00"; default the timeZone of the study.'),
      scale: z.enum(['utc', 'gps']).optional().describe('`gps` takes off the leap seconds.'),
    })
    .optional()
    .describe('How times are written.'),
  fixValues: z
    .record(z.string(), z.enum(['fixed', 'float', 'other']))
    .optional()
    .describe('Text or number in the fix column → its meaning.'),
  correctionValues: z
    .record(z.string(), z.enum(CORRECTION_KINDS))
    .optional()
    .describe('Text in the corrections column → its meaning.'),
  ...valuesOutsideColumns,
});

const nmeaLayout = z.strictObject({
  kind: z.literal('nmea').describe('NMEA 0183 sentences.'),
  ...valuesOutsideColumns,
});

export const layout = z
  .discriminatedUnion('kind', [delimitedLayout, nmeaLayout])
  .describe('How the log is written; without it its first lines are looked at.');
