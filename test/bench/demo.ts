import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { medianSeconds } from './timing.js';

/** The whole command on the demo study, as a process of its own; the aim is under 3 s. */
export async function benchDemo(): Promise<void> {
  const folder = mkdtempSync(join(tmpdir(), 'ppmwise-bench-'));
  try {
    const seconds = await medianSeconds(3, () =>
      execFileSync(process.execPath, [
        'dist/cli/main.js',
        'run',
        'datasets-demo/study.yaml',
        '--out',
        folder,
      ]),
    );
    console.log(`ppmwise run on the demo study: ${seconds.toFixed(2)} s wall (median of 3)`);
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}
