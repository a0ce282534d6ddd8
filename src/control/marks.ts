import { InputError, inputError, type Message, message, quoted } from '../logs/index.js';
import type { ControlFile } from './controlFile.js';
import { pointVersions } from './pointVersions.js';
import { type ControlRow, readControlRows } from './readControl.js';
import { type MarkSky, type PointCoordinates, SKIES, type Versioned } from './versions.js';

/** A point with known coordinates; its own fields are those of its latest version. */
export interface Mark extends PointCoordinates, Versioned {
  readonly name: string;
  readonly sky: MarkSky;
}

/** Marks by name, in the order of the file. */
export type Marks = ReadonlyMap<string, Mark>;

/** @throws InputError when the file cannot be understood or names no mark */
export async function readMarks(control: ControlFile): Promise<{ marks: Marks; messages: Message[] }> {
  const { file } = control;
  const read = await readControlRows(control, 'mark');
  const { points, errors: repeated } = pointVersions(read, 'mark', file);
  const errors = [...read.errors, ...repeated, ...read.rows.flatMap((row) => rowFault(row, file))];
  const unknownSkies: ControlRow[] = [];
  const marks = new Map<string, Mark>();
  for (const { name, rows: own, versions } of points) {
    const latest = own.at(-1)!;
    const written = latest.text('sky').toLowerCase();
    const sky = SKIES.find((each) => each === written) ?? '';
    if (sky === '' && written !== '') unknownSkies.push(latest);
    marks.set(name, { ...versions.at(-1)!, name, versions, sky });
  }
  if (errors.length > 0) throw new InputError(errors.sort((a, b) => a.row! - b.row!));
  if (marks.size === 0) {
    throw inputError('no-marks', 'Expected at least one mark, came none. Add a row for each mark.', { file });
  }
  return { marks, messages: [...read.messages, ...skyMessage(unknownSkies, file)] };
}

function rowFault({ row, name, half, coordinates }: ControlRow, file: string): Message[] {
  if (half) {
    return [
      message(
        'error',
        'half-a-position',
        `Mark ${quoted(name)} has only some of the coordinates that belong together. Fill in all of them, or none when the place is not known.`,
        { file, row },
      ),
    ];
  }
  if (!Object.values(coordinates.position).every(Number.isNaN)) return [];
  return [
    message(
      'error',
      'mark-without-coordinates',
      `Mark ${quoted(name)} has no coordinates. Fill in its plan position, its height or both, or remove the row.`,
      { file, row },
    ),
  ];
}

function skyMessage(rows: readonly ControlRow[], file: string): Message[] {
  const [first] = rows;
  if (first === undefined) return [];
  const others = rows.length === 1 ? '' : ` (and ${rows.length - 1} more)`;
  return [
    message(
      'warning',
      'unknown-sky',
      `Expected "open", "partly" or "obstructed" as the sky of a mark, came ${quoted(first.text('sky'))}${others}: the sky counts as not stated. Correct the cell or leave it blank.`,
      { file, row: first.row, column: 'sky' },
    ),
  ];
}
