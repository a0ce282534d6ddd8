import type { Control } from '../control/index.js';
import { type Geocentric, geodeticToGeocentric } from '../geodesy/index.js';
import {
  EpochStore,
  type LogBatch,
  type LogResolution,
  type Message,
  type Position,
  quoted,
  RowAccount,
  RowMessages,
  type SetAsideRow,
} from '../logs/index.js';
import { BackwardRows } from './backwardRows.js';
import { type DayOf, dayFunction } from './days.js';
import { RECORD, RECORD_WIDTH, writeRecord } from './epochRecord.js';
import { FarOffPlaces } from './farOffPlaces.js';
import type { FormedOccupations, FormOccupationsOptions } from './formOccupations.js';
import { judgeDatedRows, judgeEpochs, type NameRanks, timeOrder } from './judgeEpochs.js';
import { MotionWatch, type Watched } from './motionWatch.js';
import { isPassing, markMoving } from './movingEpochs.js';
import { Names } from './names.js';
import { NetworkWatch } from './networkWatch.js';
import type { Occupation, Visit } from './occupation.js';
import { type KeyContext, Placer } from './placer.js';
import { PointNumbers } from './pointNumbers.js';
import { VisitBuilder } from './visitBuilder.js';

/** Sorts positions by rover, mark and setup until all are there, then cuts them into visits and occupations. */
export class EpochSorter {
  readonly #store: EpochStore;
  readonly #account = new RowAccount();
  readonly #rowMessages = new RowMessages();
  readonly #messages: Message[] = [];
  readonly #fileNames = new Names();
  readonly #crewNames = new Names();
  readonly #supportNames = new Names();
  readonly #network = new NetworkWatch();
  readonly #numbers = new PointNumbers();
  readonly #farOff = new FarOffPlaces();
  readonly #resolutions = new Map<string, LogResolution>();
  readonly #record = new Float64Array(RECORD_WIDTH);
  readonly #dayOf: DayOf;
  readonly #placer: Placer;
  readonly #watch = new MotionWatch();
  readonly #backward = new BackwardRows();

  constructor(
    readonly control: Control,
    readonly options: FormOccupationsOptions,
    readonly gapMs: number,
  ) {
    this.#store = new EpochStore(RECORD_WIDTH, (options.epochsInMemory ?? 300_000) * RECORD_WIDTH);
    this.#dayOf = dayFunction(control, options.timeZone ?? null);
    this.#placer = new Placer(control, this.#dayOf, options.period ?? null);
  }

  take(batch: LogBatch): void {
    this.#account.open(batch.file);
    this.#account.read(batch.file, batch.rowsRead);
    this.#messages.push(...batch.messages);
    if (batch.resolution) this.#resolutions.set(batch.file, batch.resolution);
    for (const row of batch.setAside) this.#setAside(row);
    const { nearestMarkM = null, moveToPublishedBase = false } = batch;
    const placing = { nearestMarkM, moveToPublishedBase };
    for (const position of batch.positions) {
      this.#backward.see(position);
      this.#numbers.see(position);
      // Where nearness tells the mark, the rows around a mark tell whether the rover stood there.
      const watched =
        nearestMarkM === null ? { position, placing, motion: 0 } : this.#watch.next(position, placing);
      if (watched !== null) this.#sort(watched);
    }
  }

  reduce(): FormedOccupations {
    for (const watched of this.#watch.rest()) this.#sort(watched);
    const visits: Visit[] = [];
    const occupations: Occupation[] = [];
    const ranks: NameRanks = {
      file: this.#fileNames.ranks(),
      crew: this.#crewNames.ranks(),
      support: this.#supportNames.ranks(),
    };
    for (const { key, days } of this.#store.bags()) {
      const context = this.#placer.context(key);
      const builder = new VisitBuilder({
        ...context,
        gapMs: this.gapMs,
        windowMs: this.options.windowSeconds == null ? null : this.options.windowSeconds * 1000,
        dayOf: (utcMs) => this.#dayOfRecord(utcMs, context),
        fileNames: this.#fileNames.list,
        crewNames: this.#crewNames.list,
        supportNames: this.#supportNames.list,
      });
      for (const records of days()) this.#reduceDay(records, context, builder, ranks);
      builder.close();
      visits.push(...builder.visits);
      occupations.push(...builder.occupations);
    }
    const messages = [
      ...this.#messages,
      ...this.#backward.messages(),
      ...this.#placer.fieldBases.messages(),
      ...this.#numbers.messages(),
      ...this.#rowMessages.messages(),
    ];
    return {
      occupations: occupations.sort(byStart),
      visits: visits.sort(byStart),
      files: this.#account.accounts(),
      resolutions: this.#resolutions,
      farOff: this.#farOff.list(),
      messages,
    };
  }

  close(): void {
    this.#store.close();
  }

  #sort({ position, placing, motion }: Watched): void {
    const { file, row } = position;
    const place = this.#placer.place(position, placing);
    if ('reason' in place) {
      this.#setAside({ file, row, reason: place.reason, column: null, detail: place.detail });
      return;
    }
    const { key, frame, shift } = place;
    this.#network.see(position, place.base.name, place.day);
    const local = Number.isNaN(position.latitudeDeg) ? null : frame.toLocal(shifted(position, shift));
    if (local !== null && Math.hypot(local.eastM, local.northM, local.upM) > FARTHEST_M) {
      const detail = `positions on mark ${quoted(place.mark)} are more than ${FARTHEST_M / 1000} km from it; if it is one mark, check its coordinates, if it is all, look for swapped columns or another coordinate system`;
      this.#setAside({ file, row, reason: 'unreadable', column: null, detail });
      this.#farOff.add({ mark: place.mark, day: place.day, position });
      return;
    }
    writeRecord(
      this.#record,
      position,
      local,
      this.#fileNames.index(file),
      this.#crewNames.index(position.crew),
      this.#supportNames.index(position.extras?.support ?? ''),
      motion,
    );
    this.#store.add(key, Math.floor(this.#record[RECORD.utcMs]! / 86_400_000), this.#record);
  }

  #dayOfRecord(utcMs: number, { key, timed }: KeyContext): string {
    return timed ? this.#dayOf(utcMs, key.base) : new Date(utcMs).toISOString().slice(0, 10);
  }

  #reduceDay(records: Float64Array, context: KeyContext, builder: VisitBuilder, ranks: NameRanks): void {
    const { timed, key } = context;
    const order = timeOrder(records, ranks);
    const verdicts = timed ? judgeEpochs(records, order) : judgeDatedRows(records, order);
    if (timed) markMoving(records, order, verdicts);
    for (let k = 0; k < order.length; k++) {
      const offset = order[k]!;
      const verdict = verdicts[k]!;
      const file = this.#fileNames.list[records[offset + RECORD.file]!]!;
      const row = records[offset + RECORD.row]!;
      if (this.#network.any) {
        const day = this.#dayOfRecord(records[offset + RECORD.utcMs]!, context);
        const detail = this.#network.reason(key.rover, key.base, day);
        if (detail !== null) {
          this.#setAside({ file, row, reason: 'not-single-base', column: null, detail });
          continue;
        }
      }
      // A rover that passes a mark does not visit it, with or without a fix.
      const passes = verdict === 'moving' || (verdict === 'not-fixed' && isPassing(records, offset));
      if (!passes) builder.add(records, offset, verdict);
      if (verdict === 'used') this.#account.used(file, 1);
      else {
        const detail = verdict === 'conflicting' ? 'two positions at the same time on one mark' : '';
        this.#setAside({ file, row, reason: verdict, column: null, detail });
      }
    }
  }

  #setAside(row: SetAsideRow): void {
    this.#account.setAside(row);
    this.#rowMessages.add(row);
    this.options.onSetAside?.(row);
  }
}

/** Where a position stands, moved to where the published base puts it. */
function shifted(position: Position, shift: Geocentric | null): Geocentric {
  const place = geodeticToGeocentric(position);
  if (shift === null) return place;
  return { xM: place.xM + shift.xM, yM: place.yM + shift.yM, zM: place.zM + shift.zM };
}

/** No rover works so far from its base: the coordinates are not what they are said to be, and no mean is formed of them. */
const FARTHEST_M = 1_000_000;

/** By day, then by time (what has none comes last in its day), then by names. */
function byStart(a: Visit | Occupation, b: Visit | Occupation): number {
  return (
    compareText(a.day, b.day) ||
    startOrLast(a) - startOrLast(b) ||
    compareText(a.rover, b.rover) ||
    compareText(a.mark, b.mark) ||
    compareText(a.base, b.base) ||
    compareText(a.setup, b.setup)
  );
}

const startOrLast = ({ startMs }: Visit | Occupation): number =>
  Number.isNaN(startMs) ? Number.MAX_VALUE : startMs;

/** By code units, so that no locale changes the order. */
function compareText(x: string, y: string): number {
  return x === y ? 0 : x < y ? -1 : 1;
}
