import { type ColumnRole, roleOfHeader } from '../roles.js';

/** Unit that the name of a column states. */
export type NamedUnit = 'metre' | 'foot' | 'international-foot' | 'us-survey-foot' | 'millimetre';

const UNITS: readonly (readonly [RegExp, NamedUnit])[] = [
  [
    /^(us|u\.?s\.?)?[ _-]*(survey|s)[ _-]*(ft|foot|feet)$|^(us|u\.s\.)[ _-]*(ft|foot|feet)$|^(ft|foot|feet)[ _-]*us$/i,
    'us-survey-foot',
  ],
  [/^(i|int|intl|international)\.?[ _-]*(ft|foot|feet)$/i, 'international-foot'],
  [/^(ft|foot|feet|')$/i, 'foot'],
  [/^(m|meters?|metres?)$/i, 'metre'],
  [/^(mm|millimeters?|millimetres?)$/i, 'millimetre'],
];

const unitOf = (text: string): NamedUnit | null =>
  UNITS.find(([pattern]) => pattern.test(text.trim()))?.[1] ?? null;

/** A name and the unit at its end: `Elevation ft` → `Elevation`, `foot`. */
function parted(name: string): { readonly stem: string; readonly unit: NamedUnit | null } {
  const bracketed = /^(.*?)[([]([^)\]]*)[)\]]\s*$/.exec(name);
  if (bracketed) return { stem: bracketed[1]!.trim(), unit: unitOf(bracketed[2]!) };
  const pieces = name.trim().split(/[\s_,-]+/);
  for (let from = 1; from < pieces.length; from++) {
    const unit = unitOf(pieces.slice(from).join(' '));
    if (unit !== null) return { stem: pieces.slice(0, from).join(' '), unit };
  }
  return { stem: name, unit: null };
}

/** The unit that the name of a column states, or null. */
export const unitOfName = (name: string): NamedUnit | null => parted(name).unit;

/** The role that a name spells, also with its unit behind it without brackets. */
export const roleOfName = (name: string): ColumnRole | null =>
  roleOfHeader(name) ?? roleOfHeader(parted(name).stem);

const plain = (name: string): string =>
  parted(name)
    .stem.toLowerCase()
    .replace(/[^a-z]/g, '');

/** Whether a height is called one above sea level, as orthometric heights mostly are. */
export function soundsOrthometric(name: string): boolean {
  const stem = plain(name);
  return (
    /^(elev|elevation|el|altitude|alt)$|ortho|msl|sealevel/.test(stem) &&
    !/ell|hae/.test(stem.replace('elev', ''))
  );
}

/** Whether the name says which clock the times are read from. */
export function clockOfName(name: string): 'utc' | 'gps' | null {
  const words = name.toLowerCase();
  if (/\b(utc|gmt)\b|utc/.test(words)) return 'utc';
  return /gps/.test(words) ? 'gps' : null;
}
