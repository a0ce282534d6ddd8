import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { afterAll } from 'vitest';
import {
  type LogBatch,
  type LogFile,
  type LogLayout,
  type Message,
  type Position,
  readLogs,
  type SetAsideRow,
} from '../src/logs/index.js';

/** A folder that lives as long as the tests of one file. */
export interface TestFolder {
  readonly path: string;
  /** Writes a file and gives its path. */
  readonly write: (name: string, content: string | Uint8Array) => string;
}

export function testFolder(): TestFolder {
  const path = mkdtempSync(join(tmpdir(), 'ppmwise-test-'));
  afterAll(() => rmSync(path, { recursive: true, force: true }));
  return {
    path,
    write(name, content) {
      const file = join(path, name);
      mkdirSync(dirname(file), { recursive: true });
      writeFileSync(file, content);
      return file;
    },
  };
}

export interface ReadOptions {
  readonly layout?: Partial<LogLayout>;
  readonly coordinates?: string;
  readonly timeZone?: string | null;
}

export function logFile(path: string, file: string, options: ReadOptions = {}): LogFile {
  return {
    path,
    file,
    layout: { kind: 'delimited', ...options.layout },
    coordinates: options.coordinates ?? 'geographic',
  };
}

/** Everything that reading one log gives. */
export interface WholeLog {
  readonly rowsRead: number;
  readonly positions: readonly Position[];
  readonly setAside: readonly SetAsideRow[];
  readonly messages: readonly Message[];
}

export async function collect(batches: AsyncIterable<LogBatch>): Promise<WholeLog> {
  const whole = {
    rowsRead: 0,
    positions: [] as Position[],
    setAside: [] as SetAsideRow[],
    messages: [] as Message[],
  };
  for await (const batch of batches) {
    whole.rowsRead += batch.rowsRead;
    whole.positions.push(...batch.positions);
    whole.setAside.push(...batch.setAside);
    whole.messages.push(...batch.messages);
  }
  return whole;
}

/** Writes `text` as a log and reads it. */
export async function readText(
  folder: TestFolder,
  text: string | Uint8Array,
  options: ReadOptions = {},
): Promise<WholeLog> {
  const path = folder.write('log.csv', text);
  return collect(readLogs([logFile(path, 'log.csv', options)], { timeZone: options.timeZone ?? null }));
}
