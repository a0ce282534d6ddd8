import type { Geodetic } from '../geodesy/index.js';
import { InputError, inputError, type Message, message, quoted } from '../logs/index.js';
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
  const sigmas = ['horizontalSigmaMm', 'verticalSigmaMm'] as const;
  const { rows, messages } = await readControlRows(control, 'mark', sigmas);
  const marks = new Map<string, Mark>();
  const errors: Message[] = [];
  for (const { row, name, position, half, text, number } of rows) {
    if (half) {
      errors.push(
        message(
          'error',
          'half-a-position',
          `Mark ${quoted(name)} has only some of the coordinates that belong together. Fill in all of them, or none when the place is not known.`,
          { file: control.file, row },
        ),
      );
      continue;
    }
    if (Object.values(position).every(Number.isNaN)) {
      errors.push(
        message(
          'error',
          'mark-without-coordinates',
          `Mark ${quoted(name)} has no coordinates. Fill in its plan position, its height or both, or remove the row.`,
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
