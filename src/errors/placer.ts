import {
  type Base,
  type Control,
  coordinatesOn,
  type Mark,
  type Match,
  markFrame,
  matchBase,
  type PointCoordinates,
  type Versioned,
  validityWords,
} from '../control/index.js';
import { baselineBetween, type Geocentric, type LocalFrame } from '../geodesy/index.js';
import { type Position, quoted, type RowReason } from '../logs/index.js';
import type { DayOf } from './days.js';
import { FieldBases } from './fieldBase.js';
import { MarkFinder } from './markFinder.js';
import { remembered } from './names.js';
import { notSingleBase } from './singleBase.js';
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
  readonly markAt: PointCoordinates;
  readonly baseAt: PointCoordinates;
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
  readonly baseAt: PointCoordinates;
  /** Null when the mark is not known in plan. */
  readonly markFromBaseM: number | null;
  readonly day: string;
  readonly key: string;
  readonly frame: LocalFrame;
  /** Moves the position to where the published base puts it; null leaves it. */
  readonly shift: Geocentric | null;
}

/** What the log's entry in the study file says of its positions. */
export interface PlacingOptions {
  /** A position that names no known mark belongs to the nearest one within this distance, m. */
  readonly nearestMarkM: number | null;
  /** Positions are moved by the difference between the base coordinates in the log and the published ones. */
  readonly moveToPublishedBase: boolean;
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
  a.extras === b.extras &&
  a.file === b.file;

/** Between the parts of a key: stands in no name. */
const SEPARATOR = '\u0000';

/** Finds out to which rover, mark and setup a position belongs. */
export class Placer {
  readonly #contexts = new Map<string, KeyContext>();
  readonly #marks: MarkFinder;
  readonly #baseOf: (name: string) => Match<Base>;
  readonly #dayOf: DayOf;
  readonly #apartM = new Map<string, number>();
  /** Base coordinates of logs beside those of the bases file. */
  readonly fieldBases = new FieldBases();
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
  place(position: Position, options: PlacingOptions): Kept | Rejection {
    const { nearestMarkM, moveToPublishedBase } = options;
    const last = this.#last;
    const same =
      last !== null &&
      sameStay(last.position, position) &&
      this.#dayOfPosition(position, last.base) === last.day;
    if (same) {
      if (position.extras === null) return last;
      const moved = notSingleBase(position, last.markFromBaseM ?? baseDistanceM(position, last.baseAt));
      return moved === null ? last : { reason: 'not-single-base', detail: moved };
    }
    const place = this.#find(position, nearestMarkM);
    if ('reason' in place) return place;
    const { mark, base, day, baseAt } = place;
    const markFromBaseM = this.#fromBaseM(place);
    const detail = notSingleBase(position, markFromBaseM ?? baseDistanceM(position, baseAt));
    if (detail !== null) return { reason: 'not-single-base', detail };
    const field = this.fieldBases.of(position.extras, baseAt);
    if (field !== null) this.fieldBases.tell(field, base, position, moveToPublishedBase);
    const setup = position.setup || `${setupName(base, day)}${field?.setupSuffix ?? ''}`;
    const timed = position.dateOnly === '';
    const key = [position.rover, mark.name, base.name, setup, timed ? 'timed' : 'dated'].join(SEPARATOR);
    const { frame } = this.#context(key, { rover: position.rover, mark, base, setup, timed });
    const shift = moveToPublishedBase && field !== null ? field.toPublished : null;
    const kept = { position, mark: mark.name, base, baseAt, markFromBaseM, day, key, frame, shift };
    // Where time or place names the mark, the next row may stand on another one; a base near the rover must be seen.
    const byText = nearestMarkM === null && this.control.markTimes?.get(position.file) === undefined;
    this.#last = byText ? kept : null;
    return kept;
  }

  /** Distance of the mark from the base; null when the mark is not known in plan. */
  #fromBaseM({ mark, base, markAt, baseAt }: Place): number | null {
    if (Number.isNaN(markAt.position.latitudeDeg)) return null;
    const key = [mark.name, base.name, markAt.from, baseAt.from].join(SEPARATOR);
    let apartM = this.#apartM.get(key);
    if (apartM === undefined) {
      const heightM = Number.isNaN(markAt.position.heightM)
        ? baseAt.position.heightM
        : markAt.position.heightM;
      apartM = baselineBetween(baseAt.position, { ...markAt.position, heightM }).lengthKm * 1000;
      this.#apartM.set(key, apartM);
    }
    return apartM;
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
    const markAt = coordinatesOn(mark.point, day);
    if (markAt === null) return notValid('mark', mark.point, day);
    const baseAt = coordinatesOn(base.point, day);
    if (baseAt === null) return notValid('base', base.point, day);
    return { mark: mark.point, base: base.point, day, markAt, baseAt };
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

/** How far a position is from the base of the bases file, where its mark does not tell. */
function baseDistanceM(position: Position, { position: base }: PointCoordinates): number {
  if (Number.isNaN(position.latitudeDeg)) return Number.NaN;
  const { latitudeDeg, longitudeDeg } = position;
  return baselineBetween(base, { latitudeDeg, longitudeDeg, heightM: base.heightM }).lengthKm * 1000;
}

function notValid(what: string, point: Versioned & { readonly name: string }, day: string): Rejection {
  const detail = `the coordinates of ${what} ${quoted(point.name)} hold ${validityWords(point)}, not on ${day}`;
  return { reason: 'outside-study', detail };
}

/** A tripod is put up anew each day; a pillar is not. */
const setupName = (base: Base, day: string): string =>
  base.mounting === 'pillar' ? base.name : `${base.name} ${day}`;
