import { type Base, type Control, type Mark, markFrame, matchBase, matchMark } from '../control/index.js';
import { geodeticToGeocentric, type LocalFrame } from '../geodesy/index.js';
import {
  EpochStore,
  type FileAccount,
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
import { judgeEpochs, timeOrder } from './judgeEpochs.js';
import type { Occupation, Visit } from './occupation.js';
import { VisitBuilder, type VisitKey } from './visitBuilder.js';

export interface FormOccupationsOptions {
  /** IANA name; null takes the local mean solar day at the base. */
  readonly timeZone?: string | null | undefined;
  /** First and last day of the study, `YYYY-MM-DD`, both included. */
  readonly period?: { readonly from: string; readonly to: string } | null | undefined;
  /** A longer gap begins a new visit; default 60. */
  readonly gapSeconds?: number | undefined;
  /** Is given every set-aside row as soon as it is known, so that long lists need not stay in memory. */
  readonly onSetAside?: ((row: SetAsideRow) => void) | undefined;
  /** Is told of rows read, now and then. */
  readonly onProgress?: ((rowsRead: number) => void) | undefined;
}

export interface FormedOccupations {
  /** In the order of start time, rover and mark. */
  readonly occupations: readonly Occupation[];
  readonly visits: readonly Visit[];
  /** The account of each file: `read = used + Σ setAside`. */
  readonly files: readonly FileAccount[];
  readonly messages: readonly Message[];
}

/**
 * Reduces a stream of positions to visits and occupations. The result does not depend on the order of rows or files;
 * memory holds the occupations and a fixed budget of epochs, whatever the length of the logs.
 */
export async function formOccupations(
  batches: AsyncIterable<LogBatch>,
  control: Control,
  options: FormOccupationsOptions = {},
): Promise<FormedOccupations> {
  const sorter = new EpochSorter(control, options);
  try {
    let rowsRead = 0;
    for await (const batch of batches) {
      sorter.take(batch);
      rowsRead += batch.rowsRead;
      options.onProgress?.(rowsRead);
    }
    return sorter.reduce();
  } finally {
    sorter.close();
  }
}

/** What the epochs of one rover, mark and setup share while they wait. */
interface KeyContext {
  readonly key: VisitKey;
  readonly frame: LocalFrame;
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

class EpochSorter {
  readonly #store = new EpochStore(RECORD_WIDTH);
  readonly #account = new RowAccount();
  readonly #rowMessages = new RowMessages();
  readonly #messages: Message[] = [];
  readonly #contexts = new Map<string, KeyContext>();
  readonly #fileNames = new Names();
  readonly #crewNames = new Names();
  readonly #record = new Float64Array(RECORD_WIDTH);
  readonly #dayOf: DayOf;

  constructor(
    readonly control: Control,
    readonly options: FormOccupationsOptions,
  ) {
    this.#dayOf = dayFunction(control, options.timeZone ?? null);
  }

  take(batch: LogBatch): void {
    this.#account.open(batch.file);
    this.#account.read(batch.file, batch.rowsRead);
    this.#messages.push(...batch.messages);
    for (const row of batch.setAside) this.#setAside(row);
    for (const position of batch.positions) this.#sort(position);
  }

  reduce(): FormedOccupations {
    const visits: Visit[] = [];
    const occupations: Occupation[] = [];
    for (const { key, days } of this.#store.bags()) {
      const context = this.#contexts.get(key)!;
      const builder = new VisitBuilder({
        ...context,
        gapMs: (this.options.gapSeconds ?? 60) * 1000,
        dayOf: (utcMs) => this.#dayOf(utcMs, context.key.base),
        fileNames: this.#fileNames.list,
        crewNames: this.#crewNames.list,
      });
      for (const records of days()) this.#reduceDay(records, builder);
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
    const place = this.#place(position);
    if ('reason' in place) {
      const { file, row } = position;
      this.#setAside({ file, row, reason: place.reason, column: null, detail: place.detail });
      return;
    }
    const { mark, base, day } = place;
    const setup = position.setup || setupName(base, day);
    const key = `${position.rover}\u0000${mark.name}\u0000${base.name}\u0000${setup}`;
    const { frame } = this.#context(key, position.rover, mark, base, setup);
    const local = Number.isNaN(position.latitudeDeg) ? null : frame.toLocal(geodeticToGeocentric(position));
    writeRecord(
      this.#record,
      position,
      local,
      this.#fileNames.index(position.file),
      this.#crewNames.index(position.crew),
    );
    this.#store.add(key, Math.floor(position.utcMs / 86_400_000), this.#record);
  }

  /** The mark, base and day of a position, or why it belongs to none. */
  #place(position: Position): Place | Rejection {
    const base = matchBase(this.control, position.base);
    if (base.kind === 'unknown') return { reason: 'unknown-base', detail: base.detail };
    const mark = matchMark(this.control, position.mark);
    if (mark.kind === 'unknown') return { reason: 'unknown-mark', detail: mark.detail };
    const day = this.#dayOf(position.utcMs, base.point.name);
    const { period } = this.options;
    const outside = period && (day < period.from || day > period.to);
    if (outside) return { reason: 'outside-study', detail: `day ${day}` };
    return { mark: mark.point, base: base.point, day };
  }

  #context(key: string, rover: string, mark: Mark, base: Base, setup: string): KeyContext {
    let context = this.#contexts.get(key);
    if (context === undefined) {
      context = {
        key: { rover, mark: mark.name, base: base.name, setup },
        frame: markFrame(mark, base),
      };
      this.#contexts.set(key, context);
    }
    return context;
  }

  #reduceDay(records: Float64Array, builder: VisitBuilder): void {
    const order = timeOrder(records);
    const verdicts = judgeEpochs(records, order);
    for (let k = 0; k < order.length; k++) {
      const offset = order[k]!;
      const verdict = verdicts[k]!;
      builder.add(records, offset, verdict);
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

/** A tripod is put up anew each day; a pillar is not. */
const setupName = (base: Base, day: string): string =>
  base.mounting === 'pillar' ? base.name : `${base.name} ${day}`;

class Names {
  readonly list: string[] = [];
  readonly #indices = new Map<string, number>();

  index(name: string): number {
    let index = this.#indices.get(name);
    if (index === undefined) {
      index = this.list.length;
      this.list.push(name);
      this.#indices.set(name, index);
    }
    return index;
  }
}

function byStart(a: Visit | Occupation, b: Visit | Occupation): number {
  const compare = (x: string, y: string): number => (x < y ? -1 : x > y ? 1 : 0);
  return (
    a.startMs - b.startMs || compare(a.rover, b.rover) || compare(a.mark, b.mark) || compare(a.setup, b.setup)
  );
}
