import { createWriteStream, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { finished } from 'node:stream/promises';
import type { SetAsideRow } from '../logs/index.js';
import { csvLine } from '../report/index.js';

/** A temporary CSV file to which set-aside rows stream while they are found, so that long lists need no memory. */
export interface SetAsideFile {
  readonly path: string;
  readonly add: (row: SetAsideRow) => void;
  /** Waits until everything is written. */
  readonly close: () => Promise<void>;
  /** Removes the file. */
  readonly remove: () => void;
}

export function setAsideFile(): SetAsideFile {
  const folder = mkdtempSync(join(tmpdir(), 'ppmwise-'));
  const path = join(folder, 'set-aside.csv');
  const stream = createWriteStream(path);
  // A full disk is told when the file is closed; until then the error must not go unheard.
  const done = finished(stream);
  done.catch(() => undefined);
  stream.write(csvLine(['file', 'row', 'reason', 'column', 'detail']));
  return {
    path,
    add: ({ file, row, reason, column, detail }) => {
      if (!stream.destroyed) stream.write(csvLine([file, row, reason, column, detail]));
    },
    async close() {
      stream.end();
      await done;
    },
    remove: () => rmSync(folder, { recursive: true, force: true }),
  };
}
