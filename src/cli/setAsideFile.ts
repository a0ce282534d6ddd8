import { once } from 'node:events';
import { createWriteStream } from 'node:fs';
import type { SetAsideRow } from '../logs/index.js';
import { csvLine } from '../report/index.js';

/** A CSV file to which set-aside rows stream while they are found, so that long lists need no memory. */
export function setAsideFile(path: string): {
  readonly add: (row: SetAsideRow) => void;
  readonly close: () => Promise<void>;
} {
  const stream = createWriteStream(path);
  stream.write(csvLine(['file', 'row', 'reason', 'column', 'detail']));
  return {
    add: ({ file, row, reason, column, detail }) => {
      stream.write(csvLine([file, row, reason, column, detail]));
    },
    async close() {
      stream.end();
      await once(stream, 'finish');
    },
  };
}
