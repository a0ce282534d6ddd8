import { geocentricToGeodetic, type LocalFrame } from '../geodesy/index.js';
import { FIXED, MEASURED, RECORD } from './epochRecord.js';
import type { Verdict } from './judgeEpochs.js';
import type { Occupation, Visit } from './occupation.js';
import { RunningMean } from './runningMean.js';

/** What all epochs of one key have in common. */
export interface VisitKey {
  readonly rover: string;
  readonly mark: string;
  readonly base: string;
  readonly setup: string;
}

export interface VisitBuilderOptions {
  readonly key: VisitKey;
  readonly frame: LocalFrame;
  /** A longer gap begins a new visit. */
  readonly gapMs: number;
  /** Cuts long occupations into shots of this length; null leaves them whole. */
  readonly windowMs: number | null;
  /** False for rows with a date alone: each is a visit of its own, and its times are NaN. */
  readonly timed: boolean;
  readonly dayOf: (utcMs: number) => string;
  readonly fileNames: readonly string[];
  readonly crewNames: readonly string[];
  readonly supportNames: readonly string[];
}

interface OpenOccupation {
  readonly startMs: number;
  endMs: number;
  epochs: number;
  readonly crew: string;
  readonly support: string;
  readonly file: string;
  readonly row: number;
  readonly means: readonly RunningMean[];
}

interface OpenVisit {
  readonly startMs: number;
  endMs: number;
  rows: number;
  fixedRows: number;
  readonly crew: string;
}

/** Cuts the epochs of one key, in time order, into visits and occupations. A visit may go on over midnight. */
export class VisitBuilder {
  readonly visits: Visit[] = [];
  readonly occupations: Occupation[] = [];
  #visit: OpenVisit | null = null;
  #occupation: OpenOccupation | null = null;

  constructor(readonly options: VisitBuilderOptions) {}

  /** One record at `offset`; a duplicate or conflicting row shows presence but does not enter a mean. */
  add(records: Float64Array, offset: number, verdict: Verdict): void {
    const utcMs = records[offset + RECORD.utcMs]!;
    const { gapMs, windowMs, timed, fileNames, crewNames, supportNames } = this.options;
    const gap = (endMs: number): boolean => !timed || utcMs - endMs > gapMs;
    if (this.#visit !== null && gap(this.#visit.endMs)) this.#closeVisit();
    const crew = crewNames[records[offset + RECORD.crew]!]!;
    this.#visit ??= { startMs: utcMs, endMs: utcMs, rows: 0, fixedRows: 0, crew };
    this.#visit.endMs = utcMs;
    this.#visit.rows += 1;
    if (records[offset + RECORD.state] === FIXED) this.#visit.fixedRows += 1;
    if (verdict !== 'used') return;
    const open = this.#occupation;
    const full = open !== null && windowMs !== null && utcMs - open.startMs >= windowMs;
    if (open !== null && (full || gap(open.endMs))) this.#closeOccupation();
    this.#occupation ??= {
      startMs: utcMs,
      endMs: utcMs,
      epochs: 0,
      crew,
      support: supportNames[records[offset + RECORD.support]!]!,
      file: fileNames[records[offset + RECORD.file]!]!,
      row: records[offset + RECORD.row]!,
      means: MEASURED.map(() => new RunningMean()),
    };
    this.#occupation.endMs = utcMs;
    this.#occupation.epochs += records[offset + RECORD.epochs]!;
    for (let k = 0; k < MEASURED.length; k++) this.#occupation.means[k]!.add(records[offset + MEASURED[k]!]!);
  }

  /** To be called once after the last epoch. */
  close(): void {
    this.#closeVisit();
  }

  #closeVisit(): void {
    this.#closeOccupation();
    if (this.#visit === null) return;
    // Written out, not spread: objects of one shape take a tenth of the memory, and there may be a million.
    const { rover, mark, base, setup } = this.options.key;
    const { crew, startMs, endMs, rows, fixedRows } = this.#visit;
    const day = this.options.dayOf(startMs);
    this.visits.push({
      rover,
      mark,
      base,
      setup,
      crew,
      day,
      startMs: this.#known(startMs),
      endMs: this.#known(endMs),
      rows,
      fixedRows,
    });
    this.#visit = null;
  }

  #known(utcMs: number): number {
    return this.options.timed ? utcMs : Number.NaN;
  }

  #closeOccupation(): void {
    if (this.#occupation === null) return;
    const { rover, mark, base, setup } = this.options.key;
    const { means, crew, startMs, endMs, epochs, support, file, row } = this.#occupation;
    this.#occupation = null;
    const [eastM, northM, upM] = [means[0]!.mean, means[1]!.mean, means[2]!.mean];
    this.occupations.push({
      rover,
      mark,
      base,
      setup,
      crew,
      day: this.options.dayOf(startMs),
      startMs: this.#known(startMs),
      endMs: this.#known(endMs),
      epochs,
      position: geocentricToGeodetic(this.options.frame.toGeocentric({ eastM, northM, upM })),
      scatterEastMm: means[0]!.standardDeviation * 1000,
      scatterNorthMm: means[1]!.standardDeviation * 1000,
      scatterUpMm: means[2]!.standardDeviation * 1000,
      satellites: means[3]!.mean,
      pdop: means[4]!.mean,
      ageSeconds: means[5]!.mean,
      horizontalSigmaM: means[6]!.mean,
      verticalSigmaM: means[7]!.mean,
      tiltDeg: means[8]!.mean,
      support,
      file,
      row,
    });
  }
}
