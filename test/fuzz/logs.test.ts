import { cpSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/stats/index.js';
import { DISGUISES } from '../disguises/disguises.js';
import { testFolder } from '../files.js';
import { Fuzzer } from './check.js';
import { logKinds } from './kinds.js';

/*
 * Damaged logs of every kind: no crash, no hang, no silent zero, an account that adds up, and every row that the damage
 * did not touch read as before. `npm run bench -- fuzz` does the same for twenty times as many.
 */

const RUNS = 500;
const LONGEST_MS = 2000;

const folder = testFolder();
cpSync(fileURLToPath(new URL('../fixtures/disguises', import.meta.url)), folder.path, { recursive: true });
const kinds = await logKinds(folder.path, folder.write);

describe('damaged logs', () => {
  it('are there in every disguise', () => {
    expect(kinds).toHaveLength(DISGUISES.length);
  });

  it.each(kinds.map((kind, k) => [kind.name, kind, k] as const))('%s', async (name, kind, k) => {
    const fuzzer = new Fuzzer(kind, join(folder.path, `damaged-${k}`));
    expect((await fuzzer.clean).size).toBeGreaterThan(5);
    const random = randomStream(20250310, name);
    let compared = 0;
    for (let run = 0; run < RUNS; run++) {
      const outcome = await fuzzer.once(random);
      compared += outcome.compared;
      expect(outcome.faults.slice(0, 2), `run ${run}: ${outcome.mutated.what}`).toEqual([]);
      expect(outcome.milliseconds, `run ${run}: ${outcome.mutated.what}`).toBeLessThan(LONGEST_MS);
    }
    // Most damage leaves most rows alone: they were looked at.
    expect(compared).toBeGreaterThan((RUNS / 4) * (await fuzzer.clean).size);
  });
});
