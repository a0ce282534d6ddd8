import { WGS84 } from '../../geodesy/index.js';
import { type CoordinateChanges, changedPlace } from '../coordinateChanges.js';
import { coordinateColumns } from '../coordinateColumns.js';
import { CoordinateFault } from '../coordinateFault.js';
import { quoted } from '../messages.js';
import { parseNumber } from '../numbers.js';
import type { Fix } from '../position.js';
import type { RowReason } from '../reasons.js';
import { covariate, decimalsOf, degreesOf, type TellUnread, timeOfDayMs } from './fields.js';

/** A GGA sentence: a position with a time of day, which belongs to no date yet. */
export interface GgaRow {
  readonly kind: 'row';
  readonly row: number;
  readonly timeOfDayMs: number;
  readonly fix: Fix;
  /** All three NaN when the sentence gives no position. */
  readonly latitudeDeg: number;
  readonly longitudeDeg: number;
  /** Of the kind that the study compares; ellipsoidal unless it says otherwise. */
  readonly heightM: number;
  readonly satellites: number;
  readonly ageSeconds: number;
  /** Number of the reference station; empty when none is given. */
  readonly station: string;
  /** Decimals of the minutes and of the height; −1 without a position. */
  readonly minuteDecimals: number;
  readonly heightDecimals: number;
}

/** Why a GGA sentence gives no row. */
export interface RefusedGga {
  readonly kind: 'refused';
  readonly reason: RowReason;
  readonly column: string | null;
  readonly detail: string;
}

const { toGeodetic } = coordinateColumns('geographic');

/** Fields of a GGA sentence, the address included. */
const FIELDS = 15;
/** The fields at the end that tell of corrections may be missing. */
const FEWEST_FIELDS = 13;

/**
 * Reads the fields of a GGA sentence (NMEA 0183): time, latitude, N/S, longitude, E/W, quality, satellites, HDOP,
 * height above the geoid, M, geoid above the ellipsoid (separation), M, age of corrections, reference station.
 * Height + separation is the ellipsoidal height; without the separation that of the study file counts, and without one the
 * row is refused. Quality
 * 4 is fixed, 5 is float, any other is neither. Quality 0 means that there is no position, whatever the other fields
 * hold; a blank latitude, longitude or height means the same.
 * @param row line of the sentence
 * @param tell called for satellites or age that are no number
 * @param changes how ellipsoidal heights and places become those that the study compares; where it compares orthometric
 *   heights by the separations of the rows, a height without separation is taken as it stands
 */
export function readGga(
  fields: readonly string[],
  row: number,
  tell: TellUnread,
  changes: CoordinateChanges = {},
): GgaRow | RefusedGga {
  const count = fields.length;
  if (count < FEWEST_FIELDS || count > FIELDS) {
    return unreadable(null, `expected ${FIELDS - 1} fields in a GGA sentence, came ${count - 1}`);
  }
  const [, time, latitude, , longitude, , quality, , , height] = fields as GgaFields;
  const noPosition = quality === '0' || latitude === '' || longitude === '' || height === '';
  const timeMs = timeOfDayMs(time);
  if (Number.isNaN(timeMs)) {
    return noPosition && time === '' ? NEITHER : unreadable('time', expected('a time of day hhmmss', time));
  }
  const place = noPosition ? NOWHERE : readPlace(fields as GgaFields, changes);
  if (place.kind === 'refused') return place;
  return {
    kind: 'row',
    row,
    timeOfDayMs: timeMs,
    fix: quality === '4' ? 'fixed' : quality === '5' ? 'float' : 'other',
    latitudeDeg: place.latitudeDeg,
    longitudeDeg: place.longitudeDeg,
    heightM: place.heightM,
    satellites: covariate(fields[7], 'satellites', tell),
    ageSeconds: covariate(fields[13], 'ageSeconds', tell),
    station: fields[14] ?? '',
    minuteDecimals: noPosition ? -1 : Math.max(decimalsOf(latitude), decimalsOf(longitude)),
    heightDecimals: noPosition ? -1 : decimalsOf(height),
  };
}

/** The fields that every GGA sentence has, address to unit of the separation. */
type GgaFields = readonly [
  ...[string, string, string, string, string, string, string, string, string, string, string, string, string],
  ...string[],
];

interface Place {
  readonly kind: 'place';
  readonly latitudeDeg: number;
  readonly longitudeDeg: number;
  readonly heightM: number;
}

const NOWHERE: Place = {
  kind: 'place',
  latitudeDeg: Number.NaN,
  longitudeDeg: Number.NaN,
  heightM: Number.NaN,
};

function readPlace(fields: GgaFields, changes: CoordinateChanges): Place | RefusedGga {
  const [
    ,
    ,
    latitude,
    northSouth,
    longitude,
    eastWest,
    ,
    ,
    ,
    height,
    heightUnit,
    separation,
    separationUnit,
  ] = fields;
  const latitudeDeg = signed(degreesOf(latitude, 2), northSouth, 'N', 'S');
  if (Number.isNaN(latitudeDeg)) {
    return unreadable('latitude', expected('ddmm.mmm with N or S', `${latitude},${northSouth}`));
  }
  const longitudeDeg = signed(degreesOf(longitude, 3), eastWest, 'E', 'W');
  if (Number.isNaN(longitudeDeg)) {
    return unreadable('longitude', expected('dddmm.mmm with E or W', `${longitude},${eastWest}`));
  }
  const orthometricM = parseNumber(height);
  if (orthometricM === null || !isMetre(heightUnit)) {
    return unreadable('height', expected('a height in metres', `${height},${heightUnit}`));
  }
  const blank = separation === '';
  const asItStands = blank && changes.rowSeparations === true;
  if (blank && !asItStands && changes.separation === undefined) return NO_SEPARATION;
  const given = blank ? 0 : parseNumber(separation);
  if (given === null || !isMetre(separationUnit)) {
    const came = `${separation},${separationUnit}`;
    return unreadable('geoidSeparation', expected('a geoid separation in metres', came));
  }
  try {
    const stated = blank && !asItStands ? changes.separation : undefined;
    const separationM =
      stated === undefined ? given : stated({ latitudeDeg, longitudeDeg, heightM: orthometricM });
    const written = { latitudeDeg, longitudeDeg, heightM: orthometricM + separationM };
    toGeodetic(latitudeDeg, longitudeDeg, written.heightM);
    const place = changedPlace(written, separationM, changes, WGS84);
    // Written out: this runs for every sentence, and spreading objects takes long.
    return {
      kind: 'place',
      latitudeDeg: place.latitudeDeg,
      longitudeDeg: place.longitudeDeg,
      heightM: place.heightM,
    };
  } catch (error) {
    if (!(error instanceof CoordinateFault)) throw error;
    return unreadable('height', error.message);
  }
}

const signed = (value: number, letter: string, positive: string, negative: string): number =>
  letter === positive ? value : letter === negative ? -value : Number.NaN;

/** The unit is always metre; some receivers leave it out. */
const isMetre = (unit: string): boolean => unit === 'M' || unit === '';

const expected = (what: string, came: string): string => `expected ${what}, came ${quoted(came)}`;

const unreadable = (column: string | null, detail: string): RefusedGga => ({
  kind: 'refused',
  reason: 'unreadable',
  column,
  detail,
});

const NO_SEPARATION = unreadable(
  'geoidSeparation',
  'expected the geoid separation, came a blank field: the height is orthometric, and an ellipsoidal height cannot be formed; state geoid: constant or grid under the heights of this log',
);

/** What receivers send before they have seen a satellite. */
const NEITHER: RefusedGga = {
  kind: 'refused',
  reason: 'no-position',
  column: null,
  detail: 'neither a time nor a position in the sentence',
};
