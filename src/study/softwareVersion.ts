import { readFileSync } from 'node:fs';

/** Version of this package, so that a result says what made it. */
export function softwareVersion(): string {
  const text = readFileSync(new URL('../../package.json', import.meta.url), 'utf8');
  return (JSON.parse(text) as { version: string }).version;
}
