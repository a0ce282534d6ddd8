import { type Geocentric, geodeticToGeocentric } from '../geodesy/index.js';
import type { Position, PositionExtras } from '../logs/index.js';

/** Base places nearer to each other than this are one base put up again. */
const APART_M = 50;
/** A day's positions of one rover from so many stations, or so many base places, are not from a base of the firm. */
const MANY = 3;
/** Places are kept in cells of this size, so that a base that moves with the rover does not fill the memory. */
const CELL_M = 5;

interface Seen {
  readonly stations: Set<string>;
  readonly places: SpreadPlaces;
}

/** What the row before said. */
interface Latest {
  readonly extras: PositionExtras | null;
  readonly rover: string;
  readonly base: string;
  readonly day: string;
}

/**
 * Tells corrections of a network from those of a base: within a day the station number, or the base coordinates that
 * the log gives, keep changing with the rover. What is found does not depend on the order of rows.
 */
export class NetworkWatch {
  readonly #seen = new Map<string, Seen>();
  #last: Latest = { extras: null, rover: '', base: '', day: '' };

  /** Some rover's positions on some day are from a network. */
  any = false;

  see({ extras, rover }: Position, base: string, day: string): void {
    if (extras === null) return;
    const before = this.#last;
    const same = rover === before.rover && base === before.base && day === before.day;
    if (same && extras === before.extras) return;
    this.#last = { extras, rover, base, day };
    const key = keyOf(rover, base, day);
    const seen = this.#seen.get(key) ?? { stations: new Set(), places: new SpreadPlaces() };
    this.#seen.set(key, seen);
    const { stations, places } = seen;
    if (extras.station !== '' && stations.size < MANY) stations.add(extras.station);
    if (!Number.isNaN(extras.baseLatitudeDeg)) places.add(fieldPlace(extras));
    this.any ||= stations.size >= MANY || places.spread;
  }

  /** Why the positions of a rover on a day are not from a single base; null when they are. */
  reason(rover: string, base: string, day: string): string | null {
    const seen = this.#seen.get(keyOf(rover, base, day));
    if (seen === undefined) return null;
    if (seen.places.spread) {
      return `the base coordinates in the log move with the rover (${MANY} or more places on ${day})`;
    }
    if (seen.stations.size >= MANY) {
      return `the station number in the log keeps changing (${MANY} or more stations on ${day})`;
    }
    return null;
  }
}

const keyOf = (rover: string, base: string, day: string): string => [rover, base, day].join('\u0000');

/** Whether three of the places that were met are all apart from each other. */
class SpreadPlaces {
  readonly #cells = new Map<string, Geocentric>();
  spread = false;

  add(place: Geocentric): void {
    if (this.spread) return;
    const cell = [place.xM, place.yM, place.zM].map((value) => Math.round(value / CELL_M));
    const key = cell.join(' ');
    if (this.#cells.has(key)) return;
    const [xM, yM, zM] = cell.map((value) => value * CELL_M) as [number, number, number];
    const centre = { xM, yM, zM };
    const far = [...this.#cells.values()].filter((other) => distanceM(other, centre) > APART_M);
    this.spread = far.some((one, i) => far.slice(i + 1).some((other) => distanceM(one, other) > APART_M));
    this.#cells.set(key, centre);
  }
}

/** Where the log says that the base stands, brought to the ellipsoid: its height does not matter here. */
export const fieldPlace = ({ baseLatitudeDeg, baseLongitudeDeg }: PositionExtras): Geocentric =>
  geodeticToGeocentric({ latitudeDeg: baseLatitudeDeg, longitudeDeg: baseLongitudeDeg, heightM: 0 });

export const distanceM = (a: Geocentric, b: Geocentric): number =>
  Math.hypot(a.xM - b.xM, a.yM - b.yM, a.zM - b.zM);
