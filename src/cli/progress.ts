import { count } from '../report/index.js';

/** Counts rows on a terminal; silent where the output goes to a file. */
export function rowCounter(stream: NodeJS.WriteStream = process.stderr): {
  readonly tell: (rowsRead: number) => void;
  readonly clear: () => void;
} {
  let shown = 0;
  return {
    tell(rowsRead) {
      if (!stream.isTTY || rowsRead - shown < 50_000) return;
      shown = rowsRead;
      stream.write(`\r${count(rowsRead)} rows read`);
    },
    clear() {
      if (shown > 0) stream.write('\r\u001b[K');
    },
  };
}
