import { baselineBetween } from '../geodesy/index.js';
import { type Message, message, quoted } from '../logs/index.js';
import type { ControlRow, ControlRows } from './readControl.js';
import type { PointCoordinates } from './versions.js';

/** Rows of one point in the order of time. */
export interface PointRows {
  readonly name: string;
  readonly rows: readonly ControlRow[];
  readonly versions: readonly PointCoordinates[];
}

/**
 * Gathers the rows of each point. Several rows of one name are coordinates over time: no two may hold on the same day.
 * @returns points in the order of the file, and what is wrong with them
 */
export function pointVersions(
  { rows, nameColumn }: Pick<ControlRows, 'rows' | 'nameColumn'>,
  what: 'mark' | 'base',
  file: string,
): { points: PointRows[]; errors: Message[] } {
  const byName = new Map<string, ControlRow[]>();
  for (const row of rows) {
    const before = byName.get(row.name);
    if (before === undefined) byName.set(row.name, [row]);
    else before.push(row);
  }
  const repeated: Message[] = [];
  const points = [...byName].map(([name, list]): PointRows => {
    const inTime = [...list].sort((a, b) => compare(firstDay(a), firstDay(b)) || a.row - b.row);
    for (let k = 1; k < inTime.length; k++) {
      const [earlier, later] = [inTime[k - 1]!, inTime[k]!];
      if (lastDay(earlier) < firstDay(later)) continue;
      const [first, second] = earlier.row < later.row ? [earlier, later] : [later, earlier];
      const apart = distanceWords(first.coordinates, second.coordinates);
      repeated.push(
        message(
          'error',
          'repeated-name',
          `The ${what} ${quoted(name)} stands already in row ${first.row}, ${apart}. Keep one of the two, or state in the columns from and to on which days each holds.`,
          { file, row: second.row, column: nameColumn },
        ),
      );
    }
    return { name, rows: inTime, versions: inTime.map(({ coordinates }) => coordinates) };
  });
  return { points, errors: repeated };
}

const compare = (a: string, b: string): number => (a < b ? -1 : a > b ? 1 : 0);
const firstDay = ({ coordinates }: ControlRow): string => coordinates.from || '0000-00-00';
const lastDay = ({ coordinates }: ControlRow): string => coordinates.to || '9999-99-99';

function distanceWords(a: PointCoordinates, b: PointCoordinates): string {
  const known = [a, b].every(({ position }) => !Object.values(position).some(Number.isNaN));
  if (!known) return 'with other coordinates known';
  const apartM = baselineBetween(a.position, b.position).lengthKm * 1000;
  return apartM < 5e-5 ? 'with the same coordinates' : `${apartM.toFixed(apartM < 100 ? 4 : 0)} m away`;
}
