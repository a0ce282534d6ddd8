import type { Geodetic } from '../geodesy/index.js';
import type { Position } from '../logs/index.js';

/** A position so far from its mark that it can only be misread. */
export interface FarOffPlace {
  readonly mark: string;
  readonly day: string;
  readonly place: Geodetic;
}

/** A few places of a mark are enough to find out how they were misread. */
const KEPT_OF_A_MARK = 5;

/** Keeps a few of the positions of each mark that are too far off to be averaged: those of the first rows of a file. */
export class FarOffPlaces {
  readonly #kept = new Map<string, (FarOffPlace & { readonly file: string; readonly row: number })[]>();

  add({ mark, day, position }: { mark: string; day: string; position: Position }): void {
    const { latitudeDeg, longitudeDeg, heightM, file, row } = position;
    const list = this.#kept.get(mark) ?? [];
    this.#kept.set(mark, list);
    list.push({ mark, day, place: { latitudeDeg, longitudeDeg, heightM }, file, row });
    // In the order of files and rows, so that the order of reading does not matter.
    list.sort((a, b) => (a.file < b.file ? -1 : a.file > b.file ? 1 : a.row - b.row));
    list.length = Math.min(list.length, KEPT_OF_A_MARK);
  }

  list(): FarOffPlace[] {
    return [...this.#kept.entries()]
      .sort(([a], [b]) => (a < b ? -1 : 1))
      .flatMap(([, places]) => places.map(({ mark, day, place }) => ({ mark, day, place })));
  }
}
