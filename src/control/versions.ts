import type { Geodetic } from '../geodesy/index.js';

/** What a point's sky is like, as the marks file states it; empty when it does not. */
export const SKIES = ['open', 'partly', 'obstructed'] as const;
export type MarkSky = (typeof SKIES)[number] | '';

/** Coordinates of a mark or base with where they come from and when they hold. */
export interface PointCoordinates {
  /** Geographic coordinates and height of the kind the study compares; what is not known is NaN. */
  readonly position: Geodetic;
  /** One standard deviation, mm; horizontal is per axis; NaN when not stated. */
  readonly horizontalSigmaMm: number;
  readonly verticalSigmaMm: number;
  readonly source: string;
  /** Name of the reference frame; empty when not stated. */
  readonly frame: string;
  /** Decimal year to which the coordinates belong; NaN when not stated. */
  readonly epoch: number;
  /** First and last day on which they hold, `YYYY-MM-DD`; empty where they are open. */
  readonly from: string;
  readonly to: string;
}

/** A point whose coordinates may differ over time. */
export interface Versioned {
  /** All coordinates in the order of time, at least one; no two hold on the same day. */
  readonly versions: readonly PointCoordinates[];
}

export const holdsOn = ({ from, to }: PointCoordinates, day: string): boolean =>
  (from === '' || from <= day) && (to === '' || day <= to);

/** The coordinates that hold on a day, or null. */
export function coordinatesOn({ versions }: Versioned, day: string): PointCoordinates | null {
  const [only] = versions as readonly [PointCoordinates];
  if (versions.length === 1) return holdsOn(only, day) ? only : null;
  return versions.find((version) => holdsOn(version, day)) ?? null;
}

/** The days on which a point has coordinates, in words. */
export function validityWords({ versions }: Versioned): string {
  return versions
    .map(({ from, to }) =>
      from === '' && to === ''
        ? 'always'
        : [from && `from ${from}`, to && `to ${to}`].filter(Boolean).join(' '),
    )
    .join(', ');
}
