import { InputError, inputError, type Message, message, quoted } from '../logs/index.js';
import type { ControlFile } from './controlFile.js';
import { pointVersions } from './pointVersions.js';
import { type ControlRow, readControlRows } from './readControl.js';
import type { PointCoordinates, Versioned } from './versions.js';

/** How a base receiver is put up: a pillar keeps its place overnight, a tripod is a new setup every day. */
export type Mounting = 'tripod' | 'pillar';

/** A point on which a base receiver runs; its own fields are those of its latest version. */
export interface Base extends PointCoordinates, Versioned {
  readonly name: string;
  readonly mounting: Mounting;
}

/** Bases by name, in the order of the file. */
export type Bases = ReadonlyMap<string, Base>;

/** @throws InputError when the file cannot be understood, names no base, or a base lacks a coordinate */
export async function readBases(control: ControlFile): Promise<{ bases: Bases; messages: Message[] }> {
  const { file } = control;
  const read = await readControlRows(control, 'base');
  const { points, errors: repeated } = pointVersions(read, 'base', file);
  const errors = [...read.errors, ...repeated, ...read.rows.flatMap((row) => rowFault(row, file))];
  const bases = new Map<string, Base>();
  for (const { name, rows: own, versions } of points) {
    const mounting = mountingOf(own.at(-1)!) ?? 'tripod';
    bases.set(name, { ...versions.at(-1)!, name, versions, mounting });
  }
  if (errors.length > 0) throw new InputError(errors.sort((a, b) => a.row! - b.row!));
  if (bases.size === 0) {
    throw inputError('no-bases', 'Expected at least one base, came none. Add a row for each base.', { file });
  }
  return { bases, messages: [...read.messages] };
}

/** Null when the cell says something else. */
function mountingOf({ text }: ControlRow): Mounting | null {
  const mounting = text('mounting').toLowerCase() || 'tripod';
  return mounting === 'tripod' || mounting === 'pillar' ? mounting : null;
}

function rowFault(row: ControlRow, file: string): Message[] {
  const at = { file, row: row.row };
  if (Object.values(row.coordinates.position).some(Number.isNaN)) {
    return [
      message(
        'error',
        'base-without-coordinates',
        `Base ${quoted(row.name)} lacks a coordinate, and every baseline starts there. Fill in all three.`,
        at,
      ),
    ];
  }
  if (mountingOf(row) !== null) return [];
  return [
    message(
      'error',
      'unknown-mounting',
      `Expected "tripod" or "pillar", came ${quoted(row.text('mounting'))}. A blank cell means tripod.`,
      { ...at, column: 'mounting' },
    ),
  ];
}
