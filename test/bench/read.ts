import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { writeDelimitedLog, writeNmeaLog } from './makeLogs.js';

/** One reading in a process of its own, so that its time and its peak memory are its own. */
interface Reading {
  /** CPU from the first byte to the occupations. */
  readonly occupationsCpuSeconds: number;
  /** CPU from the first byte to the errors of the occupations; of the reading itself where only rows are read. */
  readonly cpuSeconds: number;
  readonly wallSeconds: number;
  readonly peakMb: number;
  readonly read: number;
  readonly used: number;
  readonly occupations: number;
}

/**
 * Reads, joins and reduces logs in one pass: check shots of five epochs, stays of three minutes, one static log on a
 * single mark, and NMEA sentences, each of growing length. Then the same file of check shots by an embedded SQL engine's
 * CSV reader, in the same run. Built code is measured: `npm run bench` builds first.
 */
export async function benchRead(): Promise<void> {
  const folder = mkdtempSync(join(tmpdir(), 'ppmwise-bench-'));
  const log = join(folder, 'log.csv');
  try {
    for (const [kind, epochs, sizes] of [
      ['check shots of 5 epochs', 5, [250_000, 1_000_000]],
      ['stays of 3 minutes at 1 Hz', 180, [1_000_000, 10_000_000]],
      ['one static log at 1 Hz', Number.POSITIVE_INFINITY, [1_000_000, 4_000_000]],
    ] as const) {
      for (const rows of sizes) {
        writeDelimitedLog(log, rows, epochs);
        const ours = read('delimited', log);
        tell(`${kind}, ${rows} rows × 12 columns`, rows, ours);
        if (epochs === 5 && rows === 1_000_000) compareWithSql(log, ours);
      }
    }
    for (const epochs of [250_000, 1_000_000]) {
      const sentences = writeNmeaLog(log, epochs);
      tell(`NMEA, ${sentences} sentences`, sentences, read('nmea', log));
    }
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

function read(kind: 'delimited' | 'nmea' | 'rows', log: string): Reading {
  const worker = fileURLToPath(new URL('./readWorker.mjs', import.meta.url));
  return JSON.parse(execFileSync(process.execPath, [worker, kind, log], { encoding: 'utf8' }));
}

function tell(
  what: string,
  rows: number,
  { occupationsCpuSeconds, cpuSeconds, wallSeconds, peakMb, read: n, used, occupations }: Reading,
): void {
  console.log(
    `${what}: ${occupationsCpuSeconds.toFixed(2)} s of CPU to occupations, ${cpuSeconds.toFixed(2)} s to errors, ${wallSeconds.toFixed(2)} s wall, ${Math.round(rows / wallSeconds)} a second, peak ${peakMb.toFixed(0)} MB; ${n} read, ${used} used, ${occupations} occupations`,
  );
}

/** The CSV reader of DuckDB, one thread, into columns of JavaScript. */
function compareWithSql(log: string, ours: Reading): void {
  try {
    const worker = fileURLToPath(new URL('./sqlWorker.mjs', import.meta.url));
    const output = execFileSync(process.execPath, [worker, log], {
      encoding: 'utf8',
      stdio: ['ignore', 'pipe', 'pipe'],
    });
    const { cpuSeconds, rows } = JSON.parse(output) as { cpuSeconds: number; rows: number };
    console.log(
      `  DuckDB reads the same ${rows} rows into columns in ${cpuSeconds.toFixed(2)} s of CPU: ours takes ${(read('rows', log).cpuSeconds / cpuSeconds).toFixed(2)} times that for reading alone, ${(ours.occupationsCpuSeconds / cpuSeconds).toFixed(2)} times with joining and reducing`,
    );
  } catch (error) {
    console.log(`  no comparison: DuckDB did not run (${(error as Error).message.split('\n')[0]})`);
  }
}
