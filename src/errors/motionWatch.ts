import { type Geocentric, geodeticToGeocentric } from '../geodesy/index.js';
import type { Position } from '../logs/index.js';
import { CAME_MOVING, LEFT_MOVING } from './epochRecord.js';
import { isMotion, LONGEST_STEP_MS } from './movingEpochs.js';
import type { PlacingOptions } from './placer.js';

/** A position and how the rover came to it and went on: the sum of CAME_MOVING and LEFT_MOVING, where they hold. */
export interface Watched {
  readonly position: Position;
  readonly placing: PlacingOptions;
  readonly motion: number;
}

interface Waiting extends Watched {
  readonly place: Geocentric | null;
}

/**
 * Watches how rovers move from row to row of a log, before it is known which rows belong to a mark. A rover that drives
 * past a mark may leave a single row near it, and only the rows around that one tell that it did not stand there.
 */
export class MotionWatch {
  readonly #waiting = new Map<string, Waiting>();

  /** The position of the same log and rover before this one, now that it is known how the rover went on. */
  next(position: Position, placing: PlacingOptions): Watched | null {
    const key = `${position.file}\u0000${position.rover}`;
    const place = Number.isNaN(position.latitudeDeg) ? null : geodeticToGeocentric(position);
    const before = this.#waiting.get(key);
    const moved = before !== undefined && moves(before, position, place);
    this.#waiting.set(key, { position, placing, place, motion: moved ? CAME_MOVING : 0 });
    if (before === undefined) return null;
    return { ...before, motion: before.motion | (moved ? LEFT_MOVING : 0) };
  }

  /** The last position of each rover. */
  rest(): Watched[] {
    const rest = [...this.#waiting.values()];
    this.#waiting.clear();
    return rest;
  }
}

function moves(before: Waiting, { utcMs }: Position, place: Geocentric | null): boolean {
  const ms = utcMs - before.position.utcMs;
  if (before.place === null || place === null || !(ms > 0 && ms <= LONGEST_STEP_MS)) return false;
  const { xM, yM, zM } = before.place;
  return isMotion(Math.hypot(place.xM - xM, place.yM - yM, place.zM - zM), ms);
}
