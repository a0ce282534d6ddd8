import { closeSync, mkdtempSync, openSync, readSync, rmSync, writeSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

/** All epochs of one key, as one array of records a day, the days in order. */
export interface EpochBag {
  readonly key: string;
  /** Records of `width` numbers one after the other, in the order in which they were added. */
  readonly days: () => Generator<Float64Array>;
}

interface Bucket {
  numbers: number[];
  readonly spilled: { offset: number; length: number }[];
}

const BYTES = Float64Array.BYTES_PER_ELEMENT;

/**
 * A place for the epochs of logs of any length. Logs come in any order and overlap, so an epoch can only be judged
 * (duplicate? new visit?) when all of its day are there: epochs are collected by key and day, and when they exceed
 * the budget they go to a temporary file. Memory holds the budget and one day of one key.
 */
export class EpochStore {
  readonly #buckets = new Map<string, Map<number, Bucket>>();
  #inMemory = 0;
  #folder: string | null = null;
  #file = -1;
  #fileEnd = 0;

  /**
   * @param width numbers in a record
   * @param budget numbers held in memory before they are written to disk
   */
  constructor(
    readonly width: number,
    readonly budget = 4_000_000,
  ) {}

  add(key: string, day: number, record: ArrayLike<number>): void {
    let days = this.#buckets.get(key);
    if (days === undefined) {
      days = new Map();
      this.#buckets.set(key, days);
    }
    let bucket = days.get(day);
    if (bucket === undefined) {
      bucket = { numbers: [], spilled: [] };
      days.set(day, bucket);
    }
    for (let i = 0; i < this.width; i++) bucket.numbers.push(record[i]!);
    this.#inMemory += this.width;
    if (this.#inMemory > this.budget) this.#spill();
  }

  /** The bags in the order of their keys. */
  *bags(): Generator<EpochBag> {
    for (const [key, days] of [...this.#buckets].sort(([a], [b]) => (a < b ? -1 : 1))) {
      const buckets = [...days].sort(([a], [b]) => a - b).map(([, bucket]) => bucket);
      const load = this.#load.bind(this);
      yield {
        key,
        *days() {
          for (const bucket of buckets) yield load(bucket);
        },
      };
    }
  }

  /** Removes the temporary file. To be called in a `finally`. */
  close(): void {
    if (this.#folder === null) return;
    closeSync(this.#file);
    rmSync(this.#folder, { recursive: true, force: true });
    this.#folder = null;
  }

  #spill(): void {
    if (this.#folder === null) {
      this.#folder = mkdtempSync(join(tmpdir(), 'ppmwise-'));
      this.#file = openSync(join(this.#folder, 'epochs'), 'w+');
    }
    for (const days of this.#buckets.values()) {
      for (const bucket of days.values()) {
        if (bucket.numbers.length === 0) continue;
        const numbers = Float64Array.from(bucket.numbers);
        writeFully(this.#file, numbers, this.#fileEnd);
        bucket.spilled.push({ offset: this.#fileEnd, length: numbers.length });
        this.#fileEnd += numbers.byteLength;
        bucket.numbers = [];
      }
    }
    this.#inMemory = 0;
  }

  #load(bucket: Bucket): Float64Array {
    const inMemory = bucket.numbers;
    const onDisk = bucket.spilled.reduce((total, { length }) => total + length, 0);
    const all = new Float64Array(onDisk + inMemory.length);
    let at = 0;
    for (const { offset, length } of bucket.spilled) {
      readFully(this.#file, all.subarray(at, at + length), offset);
      at += length;
    }
    all.set(inMemory, at);
    return all;
  }
}

function writeFully(file: number, numbers: Float64Array, position: number): void {
  let done = 0;
  while (done < numbers.byteLength) {
    done += writeSync(file, numbers, done, numbers.byteLength - done, position + done);
  }
}

function readFully(file: number, target: Float64Array, position: number): void {
  const bytes = new Uint8Array(target.buffer, target.byteOffset, target.length * BYTES);
  let done = 0;
  while (done < bytes.length) {
    const count = readSync(file, bytes, done, bytes.length - done, position + done);
    if (count === 0)
      throw new Error('The temporary file of epochs ended early; free disk space and run again.');
    done += count;
  }
}
