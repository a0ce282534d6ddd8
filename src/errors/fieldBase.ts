import type { Base, PointCoordinates } from '../control/index.js';
import { type Geocentric, geodeticToGeocentric, type LocalVector, localFrame } from '../geodesy/index.js';
import { type Message, message, type PositionExtras, quoted } from '../logs/index.js';
import { assumedBasePpm } from './assumedBase.js';

/** What the base coordinates that a log gives say of its positions. */
export interface FieldBase {
  /** Coordinates in the field minus those of the bases file, in the base's horizon. */
  readonly apart: LocalVector;
  /** The log gives the height of the base too; else it is taken as published. */
  readonly heightKnown: boolean;
  /** The same backwards, in geocentric axes: moves a position to where the published base puts it. */
  readonly toPublished: Geocentric;
  /** Sets the setup apart from those with other base coordinates; empty when these are the published ones. */
  readonly setupSuffix: string;
}

/** Coordinates that agree within this are the same, written with other decimals. */
const SAME_M = 0.0005;

/** Compares the base coordinates that logs give with those of the bases file, and tells where they differ. */
export class FieldBases {
  readonly #known = new Map<PositionExtras, Map<PointCoordinates, FieldBase>>();
  readonly #found = new Map<
    string,
    { file: string; row: number; base: string; field: FieldBase; moved: boolean }
  >();

  /**
   * @param published the coordinates of the base on the day of the row
   * @returns null when the log gives no base coordinates
   */
  of(extras: PositionExtras | null, published: PointCoordinates): FieldBase | null {
    if (extras === null || Number.isNaN(extras.baseLatitudeDeg)) return null;
    let byBase = this.#known.get(extras);
    if (byBase === undefined) {
      byBase = new Map();
      this.#known.set(extras, byBase);
    }
    let found = byBase.get(published);
    if (found === undefined) {
      found = compared(extras, published);
      byBase.set(published, found);
    }
    return found;
  }

  /** Remembers a difference for the message about it. */
  tell(
    field: FieldBase,
    base: Base,
    { file, row }: { readonly file: string; readonly row: number },
    moved: boolean,
  ): void {
    if (field.setupSuffix === '') return;
    const key = [file, base.name, field.setupSuffix].join('\u0000');
    const before = this.#found.get(key);
    if (before === undefined || row < before.row) {
      this.#found.set(key, { file, row, base: base.name, field, moved });
    }
  }

  messages(): Message[] {
    return [...this.#found.values()]
      .sort((a, b) => (a.file < b.file ? -1 : a.file > b.file ? 1 : a.row - b.row))
      .map(({ file, row, base, field: { apart, heightKnown }, moved }) => {
        const sizeM = Math.hypot(apart.eastM, apart.northM, apart.upM);
        const where = `The log gives base ${quoted(base)} coordinates ${sizeM.toFixed(3)} m from those of the bases file (${vectorWords(apart, heightKnown)})`;
        const ppm = `${assumedBasePpm(sizeM).toFixed(2)} ppm of every baseline (common practice: metres / 20)`;
        return moved
          ? message(
              'info',
              'moved-to-published-base',
              `${where}. Positions are moved by this difference as the study file asks; about ${ppm} stays in them.`,
              { file, row },
            )
          : message(
              'warning',
              'base-coordinates-differ',
              `${where}. Positions carry the difference as a shift, and about ${ppm}. Correct the bases file, or state moveToPublishedBase: true for this log to take the shift out.`,
              { file, row },
            );
      });
  }
}

function compared(extras: PositionExtras, { position }: PointCoordinates): FieldBase {
  const published = geodeticToGeocentric(position);
  const heightKnown = !Number.isNaN(extras.baseHeightM);
  const inField = geodeticToGeocentric({
    latitudeDeg: extras.baseLatitudeDeg,
    longitudeDeg: extras.baseLongitudeDeg,
    heightM: heightKnown ? extras.baseHeightM : position.heightM,
  });
  const difference = {
    xM: inField.xM - published.xM,
    yM: inField.yM - published.yM,
    zM: inField.zM - published.zM,
  };
  const apart = localFrame(position).rotate(difference);
  const same = Math.hypot(apart.eastM, apart.northM, apart.upM) < SAME_M;
  return {
    apart,
    toPublished: { xM: -difference.xM, yM: -difference.yM, zM: -difference.zM },
    heightKnown,
    setupSuffix: same ? '' : `, base moved ${vectorWords(apart, heightKnown)}`,
  };
}

const vectorWords = ({ eastM, northM, upM }: LocalVector, heightKnown: boolean): string =>
  `east ${signed(eastM)}, north ${signed(northM)}${heightKnown ? `, up ${signed(upM)} m` : ' m, its height is not told'}`;

function signed(metres: number): string {
  const size = Math.abs(metres).toFixed(3);
  return `${size === '0.000' ? '' : metres < 0 ? '−' : '+'}${size}`;
}
