import type { Geodetic } from '../geodesy/index.js';
import { InputError, inputError, type Message, message, quoted } from '../logs/index.js';
import { type ControlFile, readControlRows } from './readControl.js';

/** How a base receiver is put up: a pillar keeps its place overnight, a tripod is a new setup every day. */
export type Mounting = 'tripod' | 'pillar';

/** A point on which a base receiver runs. */
export interface Base {
  readonly name: string;
  readonly position: Geodetic;
  readonly mounting: Mounting;
}

/** Bases by name, in the order of the file. */
export type Bases = ReadonlyMap<string, Base>;

/** @throws InputError when the file cannot be understood, names no base, or a base lacks a coordinate */
export async function readBases(control: ControlFile): Promise<{ bases: Bases; messages: Message[] }> {
  const { file } = control;
  const { rows, messages } = await readControlRows(control, 'base');
  const bases = new Map<string, Base>();
  const errors: Message[] = [];
  for (const { row, name, position, text } of rows) {
    if (Object.values(position).some(Number.isNaN)) {
      errors.push(
        message(
          'error',
          'base-without-coordinates',
          `Base ${quoted(name)} lacks a coordinate, and every baseline starts there. Fill in all three.`,
          { file, row },
        ),
      );
      continue;
    }
    const mounting = text('mounting').toLowerCase() || 'tripod';
    if (mounting !== 'tripod' && mounting !== 'pillar') {
      errors.push(
        message(
          'error',
          'unknown-mounting',
          `Expected "tripod" or "pillar", came ${quoted(text('mounting'))}. A blank cell means tripod.`,
          { file, row, column: 'mounting' },
        ),
      );
      continue;
    }
    bases.set(name, { name, position, mounting });
  }
  if (errors.length > 0) throw new InputError(errors);
  if (bases.size === 0) {
    throw inputError('no-bases', 'Expected at least one base, came none. Add a row for each base.', { file });
  }
  return { bases, messages };
}
