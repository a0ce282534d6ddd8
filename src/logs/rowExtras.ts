import { metresPer } from '../geodesy/index.js';
import { parseDms } from './dms.js';
import type { LogUnits } from './layout.js';
import { quoted } from './messages.js';
import { NO_EXTRAS, type PositionExtras } from './position.js';
import type { ColumnRole } from './roles.js';
import type { RowCells } from './rowCells.js';
import type { NumberReaders } from './rowNumbers.js';

export interface ExtrasOptions {
  readonly has: (role: ColumnRole) => boolean;
  readonly textReader: (role: ColumnRole) => (cells: RowCells) => string;
  readonly numberReader: NumberReaders;
  readonly units: LogUnits;
}

interface ExtrasRefusal {
  readonly role: ColumnRole;
  readonly detail: string;
}

const BASE_ROLES = ['baseLatitude', 'baseLongitude', 'baseHeight'] as const;
const EXTRA_ROLES: readonly ColumnRole[] = [...BASE_ROLES, 'corrections', 'tilt', 'support'];

/**
 * A function that reads what only some logs tell of a row; null when the log tells none of it. Base coordinates are
 * degrees and ellipsoidal height; of three of which some are blank none counts.
 */
export function extrasReader({
  has,
  textReader,
  numberReader,
  units,
}: ExtrasOptions): ((cells: RowCells) => PositionExtras | ExtrasRefusal) | null {
  if (!EXTRA_ROLES.some(has)) return null;
  const base = BASE_ROLES.map((role) => {
    if (!has(role)) return () => Number.NaN;
    if (role !== 'baseHeight' && units.angle === 'dms') {
      const text = textReader(role);
      return (cells: RowCells) => parseDms(text(cells));
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
  let last = NO_EXTRAS;
  return (cells) => {
    const [latitude, longitude, height] = base.map((read) => read(cells));
    for (const [k, value] of [latitude, longitude, height].entries()) {
      if (value === null) return notANumber(BASE_ROLES[k]!, baseTexts[k]!(cells));
    }
    const tiltDeg = has('tilt') ? tilt(cells) : Number.NaN;
    if (tiltDeg === null) return notANumber('tilt', tiltText(cells));
    const whole = !Number.isNaN(latitude! + longitude! + height!);
    const extras: PositionExtras = {
      baseLatitudeDeg: whole ? latitude! : Number.NaN,
      baseLongitudeDeg: whole ? longitude! : Number.NaN,
      baseHeightM: whole ? height! : Number.NaN,
      corrections: corrections(cells),
      station: '',
      tiltDeg,
      support: support(cells),
    };
    // Rows that tell the same share one value: a log of a million rows has a few of them.
    if (!sameExtras(extras, last)) last = extras;
    return last;
  };
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
