import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';

/** Folder of the installed package. */
export const packageFolder = (): string => fileURLToPath(new URL('../..', import.meta.url));

export function packageVersion(): string {
  const text = readFileSync(new URL('../../package.json', import.meta.url), 'utf8');
  return (JSON.parse(text) as { version: string }).version;
}
