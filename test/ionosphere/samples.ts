import { existsSync, readFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { gunzipSync } from 'node:zlib';

/*
 * Real public files whose terms let them be read in tests, but that this repository does not carry: map files of the
 * IGS and whole index files. They are looked for in the folder named by PPMWISE_SAMPLES, else in a folder `shared` beside
 * the repository. Where a file is absent the tests that need it are skipped, and their titles say so.
 */

const repository = fileURLToPath(new URL('../..', import.meta.url));
const folder = process.env.PPMWISE_SAMPLES ?? join(dirname(repository.replace(/\/$/, '')), 'shared');

/** The text of a sample file, unpacked if need be; null where it is absent. */
export function sampleText(name: string): string | null {
  for (const part of ['data', 'reference/gnss-samples', '.']) {
    const path = join(folder, part, name);
    if (!existsSync(path)) continue;
    const bytes = readFileSync(path);
    return (name.endsWith('.gz') ? gunzipSync(bytes) : bytes).toString('latin1');
  }
  return null;
}

/** A title that says why a test is skipped. */
export const sampleTitle = (name: string, text: string | null): string =>
  text === null ? `${name} (skipped: the sample file is not at hand)` : name;

const fixtures = fileURLToPath(new URL('../fixtures/geomag/', import.meta.url));
export const fixtureText = (name: string): string => readFileSync(join(fixtures, name), 'utf8');
