import { type Geocentric, geodeticToGeocentric } from '../geodesy/index.js';
import type { Position } from '../logs/index.js';

/** Base places nearer to each other than this are one base put up again. */
const APART_M = 50;
/** A day's positions of one rover from so many stations, or so many base places, are not from a base of the firm. */
const MANY = 3;

interface Seen {
  readonly stations: Set<string>;
  readonly places: Geocentric[];
}

/**
 * Tells corrections of a network from those of a base: within a day the station number, or the base coordinates that
 * the log gives, keep changing with the rover.
 */
export class NetworkWatch {
  readonly #seen = new Map<string, Seen>();
  #lastKey = '';
  #last: Seen | null = null;
  #lastExtras: Position['extras'] = null;

  /** Some rover's positions on some day are from a network. */
  any = false;

  see({ extras, file, rover }: Position, base: string, day: string): void {
    if (extras === null) return;
    const key = [file, rover, base, day].join('\u0000');
    if (key === this.#lastKey && extras === this.#lastExtras) return;
    if (key !== this.#lastKey || this.#last === null) {
      this.#lastKey = key;
      this.#last = this.#seen.get(key) ?? { stations: new Set(), places: [] };
      this.#seen.set(key, this.#last);
    }
    this.#lastExtras = extras;
    const { stations, places } = this.#last;
    if (extras.station !== '' && stations.size < MANY) stations.add(extras.station);
    this.any ||= stations.size >= MANY;
    if (Number.isNaN(extras.baseLatitudeDeg) || places.length >= MANY) return;
    const place = geodeticToGeocentric({
      latitudeDeg: extras.baseLatitudeDeg,
      longitudeDeg: extras.baseLongitudeDeg,
      heightM: extras.baseHeightM,
    });
    if (places.every((other) => distanceM(other, place) > APART_M)) places.push(place);
    this.any ||= places.length >= MANY;
  }

  /** Why the positions of a rover on a day are not from a single base; null when they are. */
  reason(file: string, rover: string, base: string, day: string): string | null {
    const seen = this.#seen.get([file, rover, base, day].join('\u0000'));
    if (seen === undefined) return null;
    if (seen.places.length >= MANY) {
      return `the base coordinates in the log move with the rover (${MANY} or more places on ${day})`;
    }
    if (seen.stations.size >= MANY) {
      return `the station number in the log keeps changing (${MANY} or more stations on ${day})`;
    }
    return null;
  }
}

export const distanceM = (a: Geocentric, b: Geocentric): number =>
  Math.hypot(a.xM - b.xM, a.yM - b.yM, a.zM - b.zM);
