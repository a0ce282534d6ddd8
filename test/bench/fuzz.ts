import { cpSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { randomStream } from '../../src/stats/index.js';
import { Fuzzer } from '../fuzz/check.js';
import { logKinds } from '../fuzz/kinds.js';

const RUNS = 10_000;
const SHOWN = 3;

/**
 * Reads 10 000 damaged logs of each kind of layout, the same as test/fuzz/logs.test.ts with another seed: prints what
 * went wrong, how long reading took at most, and how many untouched rows were compared.
 */
export async function benchFuzz(): Promise<void> {
  const folder = mkdtempSync(join(tmpdir(), 'ppmwise-fuzz-'));
  try {
    cpSync(fileURLToPath(new URL('../fixtures/disguises', import.meta.url)), folder, { recursive: true });
    const write = (name: string, text: string): string => {
      writeFileSync(join(folder, name), text);
      return join(folder, name);
    };
    for (const kind of await logKinds(folder, write)) {
      const fuzzer = new Fuzzer(kind, join(folder, 'damaged'));
      const random = randomStream(1, kind.name);
      let [faulty, compared, longestMs] = [0, 0, 0];
      for (let run = 0; run < RUNS; run++) {
        const outcome = await fuzzer.once(random);
        compared += outcome.compared;
        longestMs = Math.max(longestMs, outcome.milliseconds);
        if (outcome.faults.length === 0) continue;
        faulty += 1;
        if (faulty <= SHOWN) console.log(`run ${run}, ${outcome.mutated.what}: ${outcome.faults[0]}`);
      }
      console.log(
        `${kind.name}: ${RUNS} logs, ${faulty} read wrongly, ${compared} rows compared, longest ${longestMs.toFixed(0)} ms`,
      );
    }
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}
