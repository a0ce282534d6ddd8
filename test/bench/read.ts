import { execFileSync } from 'node:child_process';
import { closeSync, mkdtempSync, openSync, rmSync, writeSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

const MARKS = 12;
const HEADER = 'time,base,mark,rover,crew,latitude,longitude,height,fix,satellites,pdop,age\n';

/**
 * Reads, joins and reduces logs in one pass, each in a process of its own so that its peak memory is its own: check
 * shots (five epochs a visit) of growing length, and one static log at 1 Hz of growing length on a single mark.
 */
export async function benchRead(): Promise<void> {
  const folder = mkdtempSync(join(tmpdir(), 'ppmwise-bench-'));
  try {
    for (const kind of ['check shots', 'static log'] as const) {
      for (const rows of [250_000, 1_000_000, 4_000_000]) {
        const log = join(folder, 'log.csv');
        writeLog(log, rows, kind === 'check shots' ? 5 : rows);
        const worker = fileURLToPath(new URL('./readWorker.ts', import.meta.url));
        const output = execFileSync(process.execPath, ['--import', 'tsx', worker, log, String(MARKS)], {
          encoding: 'utf8',
        });
        const { seconds, peakMb, occupations, read, used } = JSON.parse(output);
        console.log(
          `${kind}, ${rows} rows: ${seconds.toFixed(2)} s, ${Math.round(rows / seconds)} rows/s, peak ${peakMb.toFixed(0)} MB, ${read} read, ${used} used, ${occupations} occupations`,
        );
      }
    }
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

export const markLatitude = (mark: number): number => 44.3 + 0.02 * (mark + 1);

function writeLog(path: string, rows: number, epochsPerVisit: number): void {
  const file = openSync(path, 'w');
  writeSync(file, HEADER);
  const start = Date.UTC(2025, 2, 3, 8);
  let text = '';
  let time = start;
  for (let k = 0; k < rows; k++) {
    const visit = Math.floor(k / epochsPerVisit);
    const mark = visit % MARKS;
    time += k % epochsPerVisit === 0 && k > 0 ? 120_000 : 1000;
    const latitude = (markLatitude(mark) + ((k % 17) - 8) * 1e-8).toFixed(9);
    text += `${new Date(time).toISOString().slice(0, 19)}Z,B,M${mark},R1,north,${latitude},-18.400700010,${(133.7 + (k % 13) / 1000).toFixed(4)},fixed,21,1.4,2.0\n`;
    if (text.length > 1 << 20) {
      writeSync(file, text);
      text = '';
    }
  }
  writeSync(file, text);
  closeSync(file);
}
