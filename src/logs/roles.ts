/** What a column can be. The same words serve logs, marks, bases and the study file. */
export const COLUMN_ROLES = [
  'time',
  'mark',
  'base',
  'setup',
  'rover',
  'crew',
  'latitude',
  'longitude',
  'height',
  'easting',
  'northing',
  'x',
  'y',
  'z',
  'fix',
  'satellites',
  'pdop',
  'ageSeconds',
  'horizontalSigma',
  'verticalSigma',
  'horizontalSigmaMm',
  'verticalSigmaMm',
  'source',
  'sky',
  'mounting',
] as const;
export type ColumnRole = (typeof COLUMN_ROLES)[number];

const plain = (header: string): string => header.toLowerCase().replace(/\([^)]*\)|[\s_-]/g, '');

const BY_PLAIN_NAME = new Map<string, ColumnRole>([
  ...COLUMN_ROLES.map((role): [string, ColumnRole] => [plain(role), role]),
  ['age', 'ageSeconds'],
]);

/** The role a header spells, in any case and with any of `_`, `-`, blank and a unit in brackets; else null. */
export function roleOfHeader(header: string): ColumnRole | null {
  return BY_PLAIN_NAME.get(plain(header)) ?? null;
}
