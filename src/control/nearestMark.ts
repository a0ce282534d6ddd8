import { type Geocentric, geodeticToGeocentric } from '../geodesy/index.js';
import type { Mark, Marks } from './marks.js';

/** Finds the mark nearest to a position; marks that are not known in plan are passed over. */
export class NearestMark {
  readonly #marks: readonly Mark[];
  readonly #places: Float64Array;

  constructor(marks: Marks) {
    this.#marks = [...marks.values()].filter(({ position }) => !Number.isNaN(position.latitudeDeg));
    this.#places = Float64Array.from(
      this.#marks.flatMap(({ position }) => {
        const { xM, yM, zM } = geodeticToGeocentric({ ...position, heightM: 0 });
        return [xM, yM, zM];
      }),
    );
  }

  /**
   * The nearest mark in plan within `reachM`, or null.
   * @param onEllipsoid the position with height 0
   */
  find(onEllipsoid: Geocentric, reachM: number): Mark | null {
    const places = this.#places;
    let best = -1;
    let bestSquare = reachM * reachM;
    for (let k = 0; k < places.length; k += 3) {
      const [dx, dy, dz] = [
        places[k]! - onEllipsoid.xM,
        places[k + 1]! - onEllipsoid.yM,
        places[k + 2]! - onEllipsoid.zM,
      ];
      const square = dx * dx + dy * dy + dz * dz;
      if (square <= bestSquare) [best, bestSquare] = [k / 3, square];
    }
    return best < 0 ? null : this.#marks[best]!;
  }
}
