import type { ReadAs } from '../errors/index.js';
import { type LogFile, resolvedUnits, systemOf } from '../logs/index.js';
import type { Study } from './study.js';

/** How the coordinates of logs and marks are read. */
export function readAs({ logs, marks }: Pick<Study, 'logs' | 'marks'>): {
  logs: ReadAs[];
  marks: ReadAs;
} {
  const { length, height } = resolvedUnits(marks.units, systemOf(marks.coordinates).unit);
  return { logs: logs.map(logReadAs), marks: { system: marks.coordinates, length, height } };
}

function logReadAs({ layout, coordinates }: LogFile): ReadAs {
  if (layout.kind === 'nmea') return { system: 'geographic', length: 'metre', height: 'metre' };
  const system = layout.coordinates ?? coordinates;
  const { length, height } = resolvedUnits(layout.units, systemOf(system).unit);
  return { system, length, height };
}
