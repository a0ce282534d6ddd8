import { type ColumnRole, type Message, message, quoted } from '../logs/index.js';
import { ControlCells, type ControlCellsRow } from './controlCells.js';
import type { ControlFile } from './controlFile.js';
import { type SigmaLevel, sigmaLevel, sigmasIn } from './sigmaLevel.js';
import type { PointCoordinates } from './versions.js';

/** One row of a marks or bases file. */
export interface ControlRow {
  readonly row: number;
  readonly name: string;
  readonly coordinates: PointCoordinates;
  /** Some, but not all, of the coordinates that are only known together are given; they count as not known. */
  readonly half: boolean;
  readonly text: (role: ColumnRole) => string;
}

/** What a marks or bases file holds, and what is wrong with it. */
export interface ControlRows {
  readonly rows: readonly ControlRow[];
  readonly messages: readonly Message[];
  /** Every faulty cell; none of it may be passed over. */
  readonly errors: readonly Message[];
  /** How the file names the column of points. */
  readonly nameColumn: string;
}

/**
 * The rows of a marks or bases file, each with its coordinates as the study compares them. A blank coordinate means not
 * known (NaN).
 * @throws InputError when the header is not understood
 */
export async function readControlRows(control: ControlFile, nameRole: 'mark' | 'base'): Promise<ControlRows> {
  const cells = await ControlCells.read(control, nameRole);
  const rows: ControlRow[] = [];
  const withoutLevel: number[] = [];
  for (const row of cells.readableRows()) {
    const { text, place } = row;
    const name = text(nameRole);
    if (name === '') {
      row.report('no-name', `Expected the name of a ${nameRole}, came a blank cell. Fill it in.`, nameRole);
      continue;
    }
    const sigmas = statedSigmas(row);
    const [from, to] = [statedDay(row, 'start'), statedDay(row, 'end')];
    if (from !== '' && to !== '' && from > to) {
      row.report('bad-validity', `Expected a last day not before ${from}, came ${to}. Correct it.`, 'end');
    }
    const epoch = row.number('epoch');
    const position = place();
    if (position === null || row.faulty()) continue;
    if (sigmas.levelMissing) withoutLevel.push(row.row);
    const coordinates: PointCoordinates = {
      position: position.place,
      horizontalSigmaMm: sigmas.horizontalSigmaMm,
      verticalSigmaMm: sigmas.verticalSigmaMm,
      source: text('source'),
      frame: text('frame') || (control.frame ?? ''),
      epoch: Number.isNaN(epoch) ? (control.epoch ?? Number.NaN) : epoch,
      from,
      to,
    };
    rows.push({ row: row.row, name, coordinates, half: position.half, text });
  }
  return {
    rows,
    messages: [...cells.messages, ...levelMessage(control.file, withoutLevel)],
    errors: cells.errors,
    nameColumn: cells.header.headers.get(nameRole) ?? nameRole,
  };
}

interface StatedSigmas {
  readonly horizontalSigmaMm: number;
  readonly verticalSigmaMm: number;
  readonly levelMissing: boolean;
}

/** One standard deviation each; what is stated at another level is divided by its factor. */
function statedSigmas(row: ControlCellsRow): StatedSigmas {
  const [horizontal, vertical] = [row.number('horizontalSigmaMm'), row.number('verticalSigmaMm')];
  for (const [role, value] of [
    ['horizontalSigmaMm', horizontal],
    ['verticalSigmaMm', vertical],
  ] as const) {
    if (value < 0) {
      row.report('out-of-range', `Expected a number of at least 0, came ${value}. Correct the cell.`, role);
    }
  }
  const stated = !Number.isNaN(horizontal) || !Number.isNaN(vertical);
  const cell = row.text('sigmaLevel');
  let level: SigmaLevel | null = 'rms';
  if (stated && cell !== '') {
    level = sigmaLevel(cell);
    if (level === null) {
      row.report(
        'unknown-level',
        `Expected "rms", "68" or "95" as the level of the stated precision, came ${quoted(cell)}. Correct it.`,
        'sigmaLevel',
      );
    }
  }
  const factor = sigmasIn(level ?? 'rms');
  return {
    horizontalSigmaMm: horizontal / factor,
    verticalSigmaMm: vertical / factor,
    levelMissing: stated && cell === '',
  };
}

function levelMessage(file: string, rows: readonly number[]): Message[] {
  if (rows.length === 0) return [];
  const which = rows.length === 1 ? 'one row' : `${rows.length} rows`;
  return [
    message(
      'warning',
      'sigma-without-level',
      `Expected the level of stated precisions (column sigmaLevel: rms, 68 or 95), came none in ${which}: they are taken as one standard deviation of each axis. State the level, since a 95 % figure is twice as large.`,
      { file, row: rows[0]!, column: 'sigmaLevel' },
    ),
  ];
}

function statedDay(row: ControlCellsRow, role: 'start' | 'end'): string {
  const cell = row.text(role);
  if (cell === '' || row.isDay(cell)) return cell;
  row.report('bad-validity', `Expected a day like 2025-03-01, came ${quoted(cell)}. Correct it.`, role);
  return '';
}
