import { join } from 'node:path';
import {
  type CoordinateSystem,
  type LogLayout,
  type Recognition,
  type RecognizedLog,
  type RecognizeOptions,
  readLogs,
  recognizeLayout,
} from '../../src/logs/index.js';
import { collect, type TestFolder, type WholeLog } from '../files.js';

/** Lines as a file, each ended by a line feed. */
export const file = (...lines: readonly string[]): string => `${lines.join('\n')}\n`;

export const recognize = (
  content: string | Uint8Array,
  options: RecognizeOptions = {},
  name = 'log.csv',
): Recognition => recognizeLayout(Buffer.from(content as string), name, options);

/** A recognition that must have succeeded. */
export function recognized(
  content: string | Uint8Array,
  options: RecognizeOptions = {},
  name = 'log.csv',
): RecognizedLog {
  const found = recognize(content, options, name);
  if (found.kind === 'unrecognized') throw new Error(found.message.text);
  return found;
}

/** Codes of the doubts that must be answered. */
export const decisive = ({ unsure }: Recognition): string[] =>
  unsure.filter((doubt) => doubt.decisive).map(({ code }) => code);

export interface ReadAs {
  readonly coordinates?: CoordinateSystem;
  readonly timeZone?: string | null;
  readonly name?: string;
}

/** Writes a file and reads it under a layout. */
export function readAs(
  folder: TestFolder,
  content: string | Uint8Array,
  layout: LogLayout,
  { coordinates = 'geographic', timeZone = null, name = 'log.csv' }: ReadAs = {},
): Promise<WholeLog> {
  const path = folder.write(join('logs', name), content);
  return collect(readLogs([{ path, file: name, layout, coordinates, nearestMarkM: 1 }], { timeZone }));
}

/** Recognises a file that leaves nothing open and reads it under the result. */
export async function readRecognized(
  folder: TestFolder,
  content: string | Uint8Array,
  options: RecognizeOptions = {},
  name = 'log.csv',
): Promise<{ readonly found: RecognizedLog; readonly log: WholeLog }> {
  const found = recognized(content, options, name);
  if (!found.complete) throw new Error(`asked for ${decisive(found).join()}`);
  const { layout, coordinates } = found;
  const timeZone = options.timeZone ?? null;
  return { found, log: await readAs(folder, content, layout, { coordinates: coordinates!, timeZone, name }) };
}
