import { coordinateColumns } from '../coordinateColumns.js';
import type { CoordinateSystem } from '../coordinateSystem.js';
import { valuesFromFileName } from '../fileName.js';
import { type DelimitedLayout, decimalCharacter } from '../layout.js';
import { rowPosition } from '../rowPosition.js';
import { RowReader } from '../rowReader.js';
import type { HeadText } from './headText.js';
import type { RecognizeOptions } from './recognition.js';

/** What becomes of the rows of a head when they are read under a layout. */
export interface Trial {
  readonly rows: number;
  /** Why rows cannot be read, one text a row. */
  readonly refusals: readonly string[];
}

/** Reads a head as the whole file will be read: the test of a layout that leaves nothing to ask. */
export function tryLayout(
  head: HeadText,
  layout: DelimitedLayout,
  system: CoordinateSystem,
  fileName: string,
  options: RecognizeOptions,
): Trial {
  const coordinates = coordinateColumns(system);
  const values = layout.fromFileName === undefined ? {} : valuesFromFileName(layout.fromFileName, fileName);
  const refusals: string[] = [];
  let rows = 0;
  let read: ReturnType<typeof rowPosition> | null = null;
  const reading = { ...layout, decimal: decimalCharacter(layout.decimal), required: coordinates.roles };
  const reader = new RowReader(fileName, reading, {
    header(header) {
      const timeZone = options.timeZone ?? null;
      const noWords = { fixValues: new Map(), correctionValues: new Map() };
      read = rowPosition({ file: fileName, header, layout, coordinates, timeZone, ...noWords, values });
    },
    row(row, cells) {
      rows += 1;
      const outcome = read!(row, cells);
      if (outcome.kind === 'set-aside') refusals.push(outcome.row.detail);
    },
    fault(_, fault) {
      rows += 1;
      refusals.push(fault);
    },
    message() {
      // Whoever reads the whole file tells them.
    },
  });
  reader.take({ bytes: Buffer.from(head.text), unterminated: false });
  return { rows, refusals };
}
