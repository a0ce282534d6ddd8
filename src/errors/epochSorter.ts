import { type Base, type Control, type Mark, type Match, markFrame, matchBase } from '../control/index.js';
import { geodeticToGeocentric, type LocalFrame } from '../geodesy/index.js';
import {
  EpochStore,
  type LogBatch,
  type Message,
  type Position,
  RowAccount,
  RowMessages,
  type RowReason,
  type SetAsideRow,
} from '../logs/index.js';
import { type DayOf, dayFunction } from './days.js';
import { RECORD, RECORD_WIDTH, writeRecord } from './epochRecord.js';
import type { FormedOccupations, FormOccupationsOptions } from './formOccupations.js';
import { judgeDatedRows, judgeEpochs, type NameRanks, timeOrder } from './judgeEpochs.js';
import { MarkFinder } from './markFinder.js';
import { markMoving } from './movingEpochs.js';
import { Names, remembered } from './names.js';
import type { Occupation, Visit } from './occupation.js';
import { VisitBuilder, type VisitKey } from './visitBuilder.js';

/** What the epochs of one rover, mark and setup share while they wait. */
interface KeyContext {
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

interface Rejection {
  readonly reason: RowReason;
  readonly detail: string;
}

/** Sorts positions by rover, mark and setup until all are there, then cuts them into visits and occupations. */
export class EpochSorter {
  readonly #store: EpochStore;
  readonly #account = new RowAccount();
  readonly #rowMessages = new RowMessages();
  readonly #messages: Message[] = [];
  readonly #contexts = new Map<string, KeyContext>();
  readonly #fileNames = new Names();
  readonly #crewNames = new Names();
  readonly #record = new Float64Array(RECORD_WIDTH);
  readonly #dayOf: DayOf;
  readonly #marks: MarkFinder;
  #nearestMarkM: number | null = null;
  readonly #baseOf: (name: string) => Match<Base>;

  constructor(
    readonly control: Control,
    readonly options: FormOccupationsOptions,
    readonly gapMs: number,
  ) {
    this.#store = new EpochStore(RECORD_WIDTH, (options.epochsInMemory ?? 300_000) * RECORD_WIDTH);
    this.#dayOf = dayFunction(control, options.timeZone ?? null);
    this.#marks = new MarkFinder(control);
    this.#baseOf = remembered((name) => matchBase(control, name));
  }

  take(batch: LogBatch): void {
    this.#account.open(batch.file);
    this.#account.read(batch.file, batch.rowsRead);
    this.#messages.push(...batch.messages);
    this.#nearestMarkM = batch.nearestMarkM ?? null;
    for (const row of batch.setAside) this.#setAside(row);
    for (const position of batch.positions) this.#sort(position);
  }

  reduce(): FormedOccupations {
    const visits: Visit[] = [];
    const occupations: Occupation[] = [];
    const ranks: NameRanks = { file: this.#fileNames.ranks(), crew: this.#crewNames.ranks() };
    for (const { key, days } of this.#store.bags()) {
      const context = this.#contexts.get(key)!;
      const builder = new VisitBuilder({
        ...context,
        gapMs: this.gapMs,
        windowMs: this.options.windowSeconds == null ? null : this.options.windowSeconds * 1000,
        dayOf: (utcMs) =>
          context.timed ? this.#dayOf(utcMs, context.key.base) : new Date(utcMs).toISOString().slice(0, 10),
        fileNames: this.#fileNames.list,
        crewNames: this.#crewNames.list,
      });
      for (const records of days()) this.#reduceDay(records, context.timed, builder, ranks);
      builder.close();
      visits.push(...builder.visits);
      occupations.push(...builder.occupations);
    }
    const messages = [...this.#messages, ...this.#rowMessages.messages()];
    return {
      occupations: occupations.sort(byStart),
      visits: visits.sort(byStart),
      files: this.#account.accounts(),
      messages,
    };
  }

  close(): void {
    this.#store.close();
  }

  #sort(position: Position): void {
    const { file, row } = position;
    const place = this.#place(position);
    if ('reason' in place) {
      this.#setAside({ file, row, reason: place.reason, column: null, detail: place.detail });
      return;
    }
    const { mark, base, day } = place;
    const setup = position.setup || setupName(base, day);
    const timed = position.dateOnly === '';
    const key = [position.rover, mark.name, base.name, setup, timed ? 'timed' : 'dated'].join(SEPARATOR);
    const { frame } = this.#context(key, { rover: position.rover, mark, base, setup, timed });
    const local = Number.isNaN(position.latitudeDeg) ? null : frame.toLocal(geodeticToGeocentric(position));
    if (local !== null && Math.hypot(local.eastM, local.northM, local.upM) > FARTHEST_M) {
      const detail = `a position is more than ${FARTHEST_M / 1000} km from its mark; look for swapped columns, another coordinate system, a wrong mark`;
      this.#setAside({ file, row, reason: 'unreadable', column: null, detail });
      return;
    }
    writeRecord(
      this.#record,
      position,
      local,
      this.#fileNames.index(file),
      this.#crewNames.index(position.crew),
    );
    this.#store.add(key, Math.floor(this.#record[RECORD.utcMs]! / 86_400_000), this.#record);
  }

  /** The mark, base and day of a position, or why it belongs to none. */
  #place(position: Position): Place | Rejection {
    const base = this.#baseOf(position.base);
    if (base.kind === 'unknown') return { reason: 'unknown-base', detail: base.detail };
    const mark = this.#marks.find(position, this.#nearestMarkM);
    if (mark.kind === 'unknown') return { reason: 'unknown-mark', detail: mark.detail };
    const day = position.dateOnly || this.#dayOf(position.utcMs, base.point.name);
    const { period } = this.options;
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

  #reduceDay(records: Float64Array, timed: boolean, builder: VisitBuilder, ranks: NameRanks): void {
    const order = timeOrder(records, ranks);
    const verdicts = timed ? judgeEpochs(records, order) : judgeDatedRows(records, order);
    if (timed) markMoving(records, order, verdicts);
    for (let k = 0; k < order.length; k++) {
      const offset = order[k]!;
      const verdict = verdicts[k]!;
      // A rover that passes a mark does not visit it.
      if (verdict !== 'moving') builder.add(records, offset, verdict);
      const file = this.#fileNames.list[records[offset + RECORD.file]!]!;
      if (verdict === 'used') this.#account.used(file, 1);
      else {
        const detail = verdict === 'conflicting' ? 'two positions at the same time on one mark' : '';
        this.#setAside({ file, row: records[offset + RECORD.row]!, reason: verdict, column: null, detail });
      }
    }
  }

  #setAside(row: SetAsideRow): void {
    this.#account.setAside(row);
    this.#rowMessages.add(row);
    this.options.onSetAside?.(row);
  }
}

/** Between the parts of a key: stands in no name. */
const SEPARATOR = '\u0000';

/** No rover works so far from its base: the coordinates are not what they are said to be, and no mean is formed of them. */
const FARTHEST_M = 1_000_000;

/** A tripod is put up anew each day; a pillar is not. */
const setupName = (base: Base, day: string): string =>
  base.mounting === 'pillar' ? base.name : `${base.name} ${day}`;

function byStart(a: Visit | Occupation, b: Visit | Occupation): number {
  const compare = (x: string, y: string): number => (x < y ? -1 : x > y ? 1 : 0);
  const [startA, startB] = [a.startMs, b.startMs].map((ms) => (Number.isNaN(ms) ? Number.MAX_VALUE : ms)) as [
    number,
    number,
  ];
  return (
    compare(a.day, b.day) ||
    startA - startB ||
    compare(a.rover, b.rover) ||
    compare(a.mark, b.mark) ||
    compare(a.base, b.base) ||
    compare(a.setup, b.setup)
  );
}
