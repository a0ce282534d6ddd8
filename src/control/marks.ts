import type { Geodetic } from '../geodesy/index.js';
import { InputError, inputError, type Message, message } from '../logs/index.js';
import { type ControlFile, readControlRows } from './readControl.js';

/** A point with known coordinates. */
export interface Mark {
  readonly name: string;
  /** Geographic coordinates and ellipsoidal height; what is not known is NaN. */
  readonly position: Geodetic;
  /** Stated standard deviations of the coordinates, mm; NaN when not stated. Horizontal is per axis. */
  readonly horizontalSigmaMm: number;
  readonly verticalSigmaMm: number;
  readonly source: string;
  readonly sky: string;
}

/** Marks by name, in the order of the file. */
export type Marks = ReadonlyMap<string, Mark>;

/** @throws InputError when the file cannot be understood or names no mark */
export async function readMarks(control: ControlFile): Promise<{ marks: Marks; messages: Message[] }> {
  const { rows, messages } = await readControlRows(control, 'mark');
  const marks = new Map<string, Mark>();
  const errors: Message[] = [];
  for (const { row, name, position, text, number } of rows) {
    // Half a plan position is no position: latitude and longitude are known together or not at all.
    if (Number.isNaN(position.latitudeDeg) !== Number.isNaN(position.longitudeDeg)) {
      errors.push(
        message(
          'error',
          'half-a-position',
          `Mark "${name}" has only one of its two plan coordinates. Fill in both, or neither when the plan position is not known.`,
          { file: control.file, row },
        ),
      );
      continue;
    }
    marks.set(name, {
      name,
      position,
      horizontalSigmaMm: number('horizontalSigmaMm'),
      verticalSigmaMm: number('verticalSigmaMm'),
      source: text('source'),
      sky: text('sky'),
    });
  }
  if (errors.length > 0) throw new InputError(errors);
  if (marks.size === 0) {
    throw inputError('no-marks', 'Expected at least one mark, came none. Add a row for each mark.', {
      file: control.file,
    });
  }
  return { marks, messages };
}
