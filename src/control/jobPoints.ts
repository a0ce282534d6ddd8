import type { Geodetic } from '../geodesy/index.js';
import { InputError, inputError, type Message, message, quoted } from '../logs/index.js';
import { ControlCells } from './controlCells.js';
import type { ControlFile } from './controlFile.js';

/** A point that a job asks for. */
export interface RequestedPoint {
  readonly name: string;
  /** As the study compares coordinates; a height that is not known is NaN. */
  readonly position: Geodetic;
  /** Horizontal limit of this point alone, mm; null where it has none of its own. */
  readonly limitMm: number | null;
}

/**
 * Reads the points of a job: name, coordinates, and where wanted a height and a limit of its own (`limitMm`).
 * @throws InputError when the file cannot be understood, names no point or one twice, or a point has no plan position
 */
export async function readJobPoints(
  control: ControlFile,
): Promise<{ points: RequestedPoint[]; messages: Message[] }> {
  const { file } = control;
  const cells = await ControlCells.read(control, 'pointNumber');
  const errors: Message[] = [];
  const rowOf = new Map<string, number>();
  const points: RequestedPoint[] = [];
  for (const row of cells.readableRows()) {
    const name = row.text('pointNumber') || row.text('mark');
    const at = { file, row: row.row };
    if (name === '') {
      row.report('no-name', 'Expected the name of a point, came a blank cell. Fill it in.', 'pointNumber');
      continue;
    }
    const limitMm = row.number('limitMm');
    if (limitMm <= 0) {
      row.report(
        'out-of-range',
        `Expected a limit above 0 mm, came ${limitMm}. Correct the cell.`,
        'limitMm',
      );
    }
    const place = row.place()?.place;
    if (place === undefined || row.faulty()) continue;
    if (Number.isNaN(place.latitudeDeg)) {
      const text = `Point ${quoted(name)} has no plan position, and how far it is from a base cannot be told. Fill in its coordinates, or remove the row.`;
      errors.push(message('error', 'point-without-position', text, at));
      continue;
    }
    const before = rowOf.get(name);
    if (before !== undefined) {
      const text = `The point ${quoted(name)} stands already in row ${before}. Keep one of the two, or give it another name.`;
      errors.push(message('error', 'repeated-name', text, at));
      continue;
    }
    rowOf.set(name, row.row);
    points.push({ name, position: place, limitMm: Number.isNaN(limitMm) ? null : limitMm });
  }
  const all = [...cells.errors, ...errors];
  if (all.length > 0) throw new InputError(all.sort((a, b) => a.row! - b.row!));
  if (points.length === 0) {
    throw inputError('no-points', 'Expected at least one point of a job, came none. Add a row for each.', {
      file,
    });
  }
  return { points, messages: [...cells.messages] };
}
