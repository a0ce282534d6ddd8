import { type Control, type Mark, type Match, markAt, matchRowNames, NearestMark } from '../control/index.js';
import { geodeticToGeocentric } from '../geodesy/index.js';
import type { Position } from '../logs/index.js';
import { remembered } from './names.js';

/** Between texts that are remembered together: stands in none of them. */
const SEPARATOR = '\u0000';

/** Finds the mark to which a position belongs. */
export class MarkFinder {
  readonly #named: (texts: string) => Match<Mark>;
  readonly #nearest: NearestMark;

  constructor(readonly control: Control) {
    this.#named = remembered((texts) => {
      const [mark, pointNumber, description] = texts.split(SEPARATOR) as [string, string, string];
      return matchRowNames(control, { mark, pointNumber, description });
    });
    this.#nearest = new NearestMark(control.marks);
  }

  /**
   * The mark that the row names; else the one on which the list of stays has the rover; else the nearest one.
   * @param reachM how far the nearest mark may be; null when nearness does not count
   */
  find(position: Position, reachM: number | null): Match<Mark> {
    const { mark, pointNumber, description, file, utcMs, rover } = position;
    const named = this.#named([mark, pointNumber, description].join(SEPARATOR));
    if (named.kind === 'known') return named;
    const times = this.control.markTimes?.get(file);
    const stay = times === undefined || Number.isNaN(utcMs) ? null : markAt(times, utcMs, rover);
    if (stay !== null) return { kind: 'known', point: this.control.marks.get(stay)! };
    if (reachM !== null && !Number.isNaN(position.latitudeDeg)) {
      const point = this.#nearest.find(geodeticToGeocentric({ ...position, heightM: 0 }), reachM);
      if (point !== null) return { kind: 'known', point };
      return { kind: 'unknown', detail: `no mark lies within ${reachM} m of the position` };
    }
    if (times === undefined) return named;
    return { kind: 'unknown', detail: 'the list of stays has the rover on no mark at that time' };
  }
}
