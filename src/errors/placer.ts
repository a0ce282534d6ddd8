import { type Base, type Control, type Mark, type Match, markFrame, matchBase } from '../control/index.js';
import type { LocalFrame } from '../geodesy/index.js';
import type { Position, RowReason } from '../logs/index.js';
import type { DayOf } from './days.js';
import { MarkFinder } from './markFinder.js';
import { remembered } from './names.js';
import type { VisitKey } from './visitBuilder.js';

/** What the epochs of one rover, mark and setup share while they wait. */
export interface KeyContext {
  readonly key: VisitKey;
  readonly frame: LocalFrame;
  /** False for rows with a date and no time of day. */
  readonly timed: boolean;
}

interface Place {
  readonly mark: Mark;
  readonly base: Base;
  readonly day: string;
}

export interface Rejection {
  readonly reason: RowReason;
  readonly detail: string;
}

/** A position and where it was kept. */
export interface Kept {
  readonly position: Position;
  readonly mark: string;
  readonly base: Base;
  readonly day: string;
  readonly key: string;
  readonly frame: LocalFrame;
}

/** Whether two positions name the same mark, base, setup and rover. */
const sameStay = (a: Position, b: Position): boolean =>
  a.mark === b.mark &&
  a.pointNumber === b.pointNumber &&
  a.description === b.description &&
  a.rover === b.rover &&
  a.base === b.base &&
  a.setup === b.setup &&
  a.dateOnly === b.dateOnly &&
  a.file === b.file;

/** Between the parts of a key: stands in no name. */
const SEPARATOR = '\u0000';

/** Finds out to which rover, mark and setup a position belongs. */
export class Placer {
  readonly #contexts = new Map<string, KeyContext>();
  readonly #marks: MarkFinder;
  readonly #baseOf: (name: string) => Match<Base>;
  readonly #dayOf: DayOf;
  #last: Kept | null = null;

  /** @param period first and last day of the study; null takes every day */
  constructor(
    readonly control: Control,
    dayOf: DayOf,
    readonly period: { readonly from: string; readonly to: string } | null,
  ) {
    this.#marks = new MarkFinder(control);
    this.#baseOf = remembered((name) => matchBase(control, name));
    this.#dayOf = dayOf;
  }

  /** What all positions of a key share. */
  context(key: string): KeyContext {
    return this.#contexts.get(key)!;
  }

  /** Where a position is kept; consecutive positions of one stay are answered from memory. */
  place(position: Position, nearestMarkM: number | null): Kept | Rejection {
    const last = this.#last;
    const same =
      last !== null &&
      sameStay(last.position, position) &&
      this.#dayOfPosition(position, last.base) === last.day;
    if (same) return last;
    const place = this.#find(position, nearestMarkM);
    if ('reason' in place) return place;
    const { mark, base, day } = place;
    const setup = position.setup || setupName(base, day);
    const timed = position.dateOnly === '';
    const key = [position.rover, mark.name, base.name, setup, timed ? 'timed' : 'dated'].join(SEPARATOR);
    const { frame } = this.#context(key, { rover: position.rover, mark, base, setup, timed });
    const kept = { position, mark: mark.name, base, day, key, frame };
    // Where time or place names the mark, the next row may stand on another one.
    const byText = nearestMarkM === null && this.control.markTimes?.get(position.file) === undefined;
    this.#last = byText ? kept : null;
    return kept;
  }

  #dayOfPosition({ dateOnly, utcMs }: Position, base: Base): string {
    return dateOnly || this.#dayOf(utcMs, base.name);
  }

  /** The mark, base and day of a position, or why it belongs to none. */
  #find(position: Position, nearestMarkM: number | null): Place | Rejection {
    const base = this.#baseOf(position.base);
    if (base.kind === 'unknown') return { reason: 'unknown-base', detail: base.detail };
    const mark = this.#marks.find(position, nearestMarkM);
    if (mark.kind === 'unknown') return { reason: 'unknown-mark', detail: mark.detail };
    const day = this.#dayOfPosition(position, base.point);
    const { period } = this;
    const outside = period && (day < period.from || day > period.to);
    if (outside) return { reason: 'outside-study', detail: `day ${day}` };
    return { mark: mark.point, base: base.point, day };
  }

  #context(
    key: string,
    {
      rover,
      mark,
      base,
      setup,
      timed,
    }: { rover: string; mark: Mark; base: Base; setup: string; timed: boolean },
  ): KeyContext {
    let context = this.#contexts.get(key);
    if (context === undefined) {
      context = {
        key: { rover, mark: mark.name, base: base.name, setup },
        frame: markFrame(mark, base),
        timed,
      };
      this.#contexts.set(key, context);
    }
    return context;
  }
}

/** A tripod is put up anew each day; a pillar is not. */
const setupName = (base: Base, day: string): string =>
  base.mounting === 'pillar' ? base.name : `${base.name} ${day}`;
