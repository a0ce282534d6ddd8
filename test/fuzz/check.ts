import { writeFileSync } from 'node:fs';
import { isDeepStrictEqual } from 'node:util';
import { formOccupations } from '../../src/errors/index.js';
import { type LogBatch, readLogs } from '../../src/logs/index.js';
import type { WholeLog } from '../files.js';
import type { LogKind } from './kinds.js';
import { lineStarts, type Mutated, mutate } from './mutate.js';

/** One damaged log: what is wrong with how it was read (nothing, if all is well), and how long that took. */
export interface FuzzOutcome {
  readonly faults: readonly string[];
  readonly milliseconds: number;
  readonly mutated: Mutated;
  /** Untouched lines that were compared with the whole log. */
  readonly compared: number;
}

/** What each line of a log came to, without its place. */
function byLine({ positions, setAside }: WholeLog): ReadonlyMap<number, unknown> {
  return new Map<number, unknown>([
    ...positions.map(({ row, ...rest }): [number, unknown] => [row, rest]),
    ...setAside.map(({ row, ...rest }): [number, unknown] => [row, rest]),
  ]);
}

/** Damages logs of one kind and judges how they are read. */
export class Fuzzer {
  readonly #path: string;
  readonly #clean: Promise<ReadonlyMap<number, unknown>>;

  /** @param path where damaged logs are written; each replaces the one before */
  constructor(
    readonly kind: LogKind,
    path: string,
  ) {
    this.#path = path;
    this.#clean = this.#read(kind.log.path).then(byLine);
  }

  /** The rows of the log as it was, by line. */
  get clean(): Promise<ReadonlyMap<number, unknown>> {
    return this.#clean;
  }

  async once(random: () => number): Promise<FuzzOutcome> {
    const mutated = mutate(this.kind.bytes, random);
    writeFileSync(this.#path, mutated.bytes);
    const start = performance.now();
    try {
      const whole = await this.#read(this.#path);
      const milliseconds = performance.now() - start;
      const compared = this.#comparable(mutated);
      return {
        mutated,
        milliseconds,
        compared: compared.length,
        faults: [
          ...accountFaults(whole),
          ...(await this.#formingFaults(whole)),
          ...silentZeros(whole, mutated.bytes),
          ...this.#countFaults(whole, mutated),
          ...changedRows(await this.#clean, byLine(whole), compared),
        ],
      };
    } catch (error) {
      const milliseconds = performance.now() - start;
      return { mutated, milliseconds, compared: 0, faults: [`it threw ${(error as Error).stack}`] };
    }
  }

  /** The log under its own name, so that what its name says stays. */
  #read(path: string): Promise<WholeLog> {
    const { log, timeZone } = this.kind;
    return joined(readLogs([{ ...log, path }], { timeZone }));
  }

  /** A header that was not damaged and stands where it stood: only then the rows below it must mean the same. */
  #headed({ whole, damaged }: Mutated): boolean {
    const { headerLine } = this.kind;
    return headerLine === 0 || (whole.get(headerLine) === headerLine && !damaged.has(headerLine));
  }

  /** Lines of the log as it was and of the damaged one that must come to the same. */
  #comparable(mutated: Mutated): (readonly [before: number, after: number])[] {
    if (!this.#headed(mutated)) return [];
    const pairs = [...mutated.whole];
    if (this.kind.log.layout.kind !== 'nmea') {
      // Without a header the first line says how many columns there are.
      return this.kind.headerLine > 0 || mutated.whole.get(1) === 1 ? pairs : [];
    }
    // A GGA sentence takes its date from the RMC sentence in front of it.
    return pairs.filter(([before, after]) => mutated.whole.get(before - 1) === after - 1);
  }

  async #formingFaults(whole: WholeLog): Promise<string[]> {
    const { log, control, timeZone } = this.kind;
    async function* batches(): AsyncGenerator<LogBatch> {
      yield { file: log.file, ...whole, nearestMarkM: log.nearestMarkM };
    }
    const { files } = await formOccupations(batches(), control, { timeZone });
    return files.flatMap(({ read, used, setAside }) => {
      const aside = Object.values(setAside).reduce((sum, { count }) => sum + count, 0);
      return read === used + aside ? [] : [`${read} read, ${used} used, ${aside} set aside`];
    });
  }

  /** Rows counted apart from the reader. */
  #countFaults({ rowsRead }: WholeLog, mutated: Mutated): string[] {
    const { kind } = this;
    if (!this.#headed(mutated)) return [];
    const count =
      kind.log.layout.kind === 'nmea' ? countSentences(mutated.bytes) : countRows(kind, mutated.bytes);
    return count === rowsRead ? [] : [`${count} rows counted, ${rowsRead} read`];
  }
}

/** All batches of a log as one. The tests' own helper for this works only under the test runner. */
async function joined(batches: AsyncIterable<LogBatch>): Promise<WholeLog> {
  const all: LogBatch[] = [];
  for await (const batch of batches) all.push(batch);
  return {
    rowsRead: all.reduce((total, { rowsRead }) => total + rowsRead, 0),
    positions: all.flatMap(({ positions }) => positions),
    setAside: all.flatMap(({ setAside }) => setAside),
    messages: all.flatMap(({ messages }) => messages),
  };
}

function accountFaults({ rowsRead, positions, setAside }: WholeLog): string[] {
  const found = positions.length + setAside.length;
  return found === rowsRead ? [] : [`${rowsRead} rows read, ${found} accounted for`];
}

function lineTexts(bytes: Buffer): string[] {
  const starts = lineStarts(bytes);
  return starts.map((start, k) => bytes.toString('latin1', start, starts[k + 1] ?? bytes.length));
}

/** A latitude or longitude of 0 in a row that spells no zero comes from a blank. */
function silentZeros({ positions }: WholeLog, bytes: Buffer): string[] {
  const lines = lineTexts(bytes);
  return positions
    .filter(({ latitudeDeg, longitudeDeg }) => latitudeDeg === 0 || longitudeDeg === 0)
    .filter(({ row }) => !/(?<![\d.])[-+]?0*[.,]?0+[.,]?0*(?![\d.])|e-\d/i.test(lines[row - 1] ?? ''))
    .map(({ row }) => `a silent zero in row ${row}`);
}

/** Lines that are neither blank nor a comment nor the header, from the header on. */
function countRows({ headerLine, bytes: original }: LogKind, bytes: Buffer): number {
  const blank = (line: string): boolean => /^[\t\n\v\f\r \u00a0]*$/.test(line) && !/[\v\f]/.test(line);
  const header = lineTexts(original)[0]!.trimEnd();
  return lineTexts(bytes)
    .slice(headerLine)
    .filter(
      (line) => !blank(line) && !line.startsWith('#') && (headerLine === 0 || line.trimEnd() !== header),
    ).length;
}

/** A line is looked at up to here. */
const LONGEST_LINE = 1_000_000;

/** Beginnings of GGA sentences of any talker but P. */
function countSentences(bytes: Buffer): number {
  return lineTexts(bytes).reduce(
    (count, line) => count + (line.slice(0, LONGEST_LINE).match(/\$(?!P)[A-Z][A-Z0-9]GGA/g)?.length ?? 0),
    0,
  );
}

function changedRows(
  clean: ReadonlyMap<number, unknown>,
  came: ReadonlyMap<number, unknown>,
  pairs: readonly (readonly [number, number])[],
): string[] {
  return pairs
    .filter(([before, after]) => !isDeepStrictEqual(clean.get(before), came.get(after)))
    .map(
      ([before, after]) =>
        `row ${after}, untouched row ${before}: ${JSON.stringify(came.get(after))} instead of ${JSON.stringify(clean.get(before))}`,
    );
}
