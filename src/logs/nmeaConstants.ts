import type { CoordinateChanges } from './coordinateChanges.js';
import { fieldBasePlace } from './fieldBasePlace.js';
import { quoted, quotedList } from './messages.js';
import { parseNumber } from './numbers.js';
import { CORRECTION_KINDS, NO_EXTRAS, type Position, type PositionExtras } from './position.js';
import type { ColumnRole } from './roles.js';
import { plainWord, wordMeanings } from './wordMeanings.js';

type Values = Readonly<Partial<Record<ColumnRole, string>>>;

const TEXTS = ['mark', 'pointNumber', 'description', 'base', 'setup', 'rover', 'crew'] as const;
const NUMBERS = ['baseLatitude', 'baseLongitude', 'baseHeight', 'tilt'] as const;
const TAKEN: readonly ColumnRole[] = [...TEXTS, ...NUMBERS, 'corrections', 'support', 'date'];

/** What constants and the file name say beside the sentences of a log. */
export interface NmeaConstants {
  readonly texts: Pick<Position, (typeof TEXTS)[number]>;
  /** What a row tells together with what is stated for all rows; rows that say the same share one value. */
  readonly extras: (own: PositionExtras | null) => PositionExtras | null;
}

/** @throws Error for a value that is no number, and for a role of which the sentences themselves tell */
export function nmeaConstants(values: Values, changes: CoordinateChanges = {}): NmeaConstants {
  const odd = (Object.keys(values) as ColumnRole[]).filter((role) => !TAKEN.includes(role));
  if (odd.length > 0) {
    throw new Error(
      `constants of NMEA sentences may be ${TAKEN.join(', ')}, came ${quotedList(odd)}, which the sentences tell themselves or cannot carry`,
    );
  }
  const texts = Object.fromEntries(TEXTS.map((role) => [role, values[role] ?? '']));
  return { texts: texts as NmeaConstants['texts'], extras: extrasOf(values, changes) };
}

function extrasOf(values: Values, changes: CoordinateChanges): NmeaConstants['extras'] {
  const [latitudeDeg, longitudeDeg, heightM, tiltDeg] = NUMBERS.map((role) => {
    const value = parseNumber(values[role] ?? '');
    if (value === null) throw new Error(`${role}: expected a number, came ${quoted(values[role]!)}`);
    return value;
  }) as [number, number, number, number];
  const place = Number.isNaN(latitudeDeg + longitudeDeg)
    ? null
    : fieldBasePlace(changes)({ latitudeDeg, longitudeDeg, heightM });
  const { corrections = '', support = '' } = values;
  const stated: PositionExtras = {
    ...NO_EXTRAS,
    baseLatitudeDeg: place?.latitudeDeg ?? Number.NaN,
    baseLongitudeDeg: place?.longitudeDeg ?? Number.NaN,
    baseHeightM: place?.heightM ?? Number.NaN,
    corrections: wordMeanings(CORRECTION_KINDS).get(plainWord(corrections)) ?? corrections,
    tiltDeg,
    support,
  };
  const nothing = Object.values(stated).every((value) => value === '' || Number.isNaN(value));
  if (nothing) return (own) => own;
  const byStation = new Map<string, PositionExtras>();
  return (own) => {
    const station = own?.station ?? '';
    const known = byStation.get(station) ?? { ...stated, station };
    byStation.set(station, known);
    return known;
  };
}
