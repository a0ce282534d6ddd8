import { type Geodetic, metresPer } from '../geodesy/index.js';
import { CoordinateFault } from './coordinateFault.js';
import { parseDms } from './dms.js';
import type { LogUnits } from './layout.js';
import { quoted } from './messages.js';
import { type Corrections, NO_EXTRAS, type PositionExtras } from './position.js';
import type { ColumnRole } from './roles.js';
import type { RowCells } from './rowCells.js';
import type { NumberReaders } from './rowNumbers.js';
import { plainWord } from './wordMeanings.js';

export interface ExtrasOptions {
  readonly has: (role: ColumnRole) => boolean;
  readonly textReader: (role: ColumnRole) => (cells: RowCells) => string;
  readonly numberReader: NumberReaders;
  readonly units: LogUnits;
  /** Character of the decimal mark. */
  readonly decimal: string;
  /** Text of the corrections column, lower case → meaning. */
  readonly correctionValues: ReadonlyMap<string, Corrections>;
  /**
   * Brings the base's coordinates in the field to what the study compares, as the positions of the log are.
   * @throws CoordinateFault where they cannot be
   */
  readonly toStudy: (place: Geodetic) => Geodetic;
}

interface ExtrasRefusal {
  readonly role: ColumnRole;
  readonly detail: string;
}

const BASE_ROLES = ['baseLatitude', 'baseLongitude', 'baseHeight'] as const;
const EXTRA_ROLES: readonly ColumnRole[] = [...BASE_ROLES, 'corrections', 'tilt', 'support'];

/**
 * A function that reads what only some logs tell of a row; null when the log tells none of it. Base coordinates are
 * degrees and a height of the kind of the log's own; of latitude and longitude both count or none, and a height that is
 * blank or cannot be brought to the kind that the study compares stays NaN.
 */
export function extrasReader({
  has,
  textReader,
  numberReader,
  units,
  decimal,
  correctionValues,
  toStudy,
}: ExtrasOptions): ((cells: RowCells) => PositionExtras | ExtrasRefusal) | null {
  if (!EXTRA_ROLES.some(has)) return null;
  const base = BASE_ROLES.map((role) => {
    if (!has(role)) return () => Number.NaN;
    if (role !== 'baseHeight' && units.angle === 'dms') {
      const text = textReader(role);
      return (cells: RowCells) => parseDms(decimal === '.' ? text(cells) : text(cells).replace(decimal, '.'));
    }
    const read = numberReader(role);
    const factor = role === 'baseHeight' ? metresPer(units.height) : 1;
    return (cells: RowCells) => {
      const value = read(cells);
      return value === null ? null : value * factor;
    };
  });
  const [corrections, support, tiltText] = [
    textReader('corrections'),
    textReader('support'),
    textReader('tilt'),
  ];
  const tilt = numberReader('tilt');
  const baseTexts = BASE_ROLES.map(textReader);
  const places = new FieldPlaces(toStudy);
  let last = NO_EXTRAS;
  return (cells) => {
    const [latitude, longitude, height] = base.map((read) => read(cells));
    for (const [k, value] of [latitude, longitude, height].entries()) {
      if (value === null) return notANumber(BASE_ROLES[k]!, baseTexts[k]!(cells));
    }
    const tiltDeg = has('tilt') ? tilt(cells) : Number.NaN;
    if (tiltDeg === null) return notANumber('tilt', tiltText(cells));
    const place = places.of(latitude!, longitude!, height!);
    if ('detail' in place) return place;
    const word = corrections(cells);
    const extras: PositionExtras = {
      baseLatitudeDeg: place.latitudeDeg,
      baseLongitudeDeg: place.longitudeDeg,
      baseHeightM: place.heightM,
      corrections: correctionValues.get(plainWord(word)) ?? word,
      station: '',
      tiltDeg,
      support: support(cells),
    };
    // Rows that tell the same share one value: a log of a million rows has a few of them.
    if (!sameExtras(extras, last)) last = extras;
    return last;
  };
}

const NOWHERE: Geodetic = { latitudeDeg: Number.NaN, longitudeDeg: Number.NaN, heightM: Number.NaN };

/** Places of the base as the study compares them. Most rows give that of the row before. */
class FieldPlaces {
  #latitudeDeg = Number.NaN;
  #longitudeDeg = Number.NaN;
  #heightM = Number.NaN;
  #place: Geodetic | ExtrasRefusal = NOWHERE;

  constructor(readonly toStudy: (place: Geodetic) => Geodetic) {}

  of(latitudeDeg: number, longitudeDeg: number, heightM: number): Geodetic | ExtrasRefusal {
    const same =
      Object.is(latitudeDeg, this.#latitudeDeg) &&
      Object.is(longitudeDeg, this.#longitudeDeg) &&
      Object.is(heightM, this.#heightM);
    if (same) return this.#place;
    [this.#latitudeDeg, this.#longitudeDeg, this.#heightM] = [latitudeDeg, longitudeDeg, heightM];
    this.#place = Number.isNaN(latitudeDeg + longitudeDeg)
      ? NOWHERE
      : this.#read({ latitudeDeg, longitudeDeg, heightM });
    return this.#place;
  }

  #read(place: Geodetic): Geodetic | ExtrasRefusal {
    try {
      return this.toStudy(place);
    } catch (error) {
      if (!(error instanceof CoordinateFault)) throw error;
      return { role: BASE_ROLES[error.index], detail: error.message };
    }
  }
}

const sameExtras = (a: PositionExtras, b: PositionExtras): boolean =>
  Object.is(a.baseLatitudeDeg, b.baseLatitudeDeg) &&
  Object.is(a.baseLongitudeDeg, b.baseLongitudeDeg) &&
  Object.is(a.baseHeightM, b.baseHeightM) &&
  Object.is(a.tiltDeg, b.tiltDeg) &&
  a.corrections === b.corrections &&
  a.support === b.support;

const notANumber = (role: ColumnRole, cell: string): ExtrasRefusal => ({
  role,
  detail: `expected a number, came ${quoted(cell)}`,
});
