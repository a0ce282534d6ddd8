import type { LogRow } from '../src/campaign/index.js';
import { projection } from '../src/geodesy/index.js';

const UTM_27 = '+proj=utm +zone=27 +ellps=WGS84';
/** The firm's clocks: one hour behind UTC. */
const OFFSET_MS = -3_600_000;

/**
 * One day of the campaign as another controller would export it: one averaged row a shot, plane coordinates, semicolons,
 * decimal commas, local time, and the mark in a description. For trying out how an unknown layout is understood.
 */
export function pointListText(rows: readonly LogRow[], day: string): string {
  const { forward } = projection(UTM_27);
  const comma = (value: number, digits: number): string => value.toFixed(digits).replace('.', ',');
  const shots = occupations(
    rows.filter(({ timeMs, fix }) => localText(timeMs).startsWith(day) && fix === 'fixed'),
  );
  const lines = shots.map((shot, k) => {
    const mean = (value: (row: LogRow) => number): number =>
      shot.reduce((sum, row) => sum + value(row), 0) / shot.length;
    const { eastingM, northingM } = forward({
      latitudeDeg: mean((row) => row.latitudeDeg),
      longitudeDeg: mean((row) => row.longitudeDeg),
    });
    const [first] = shot as [LogRow];
    const [date, time] = localText(first.timeMs).split(' ') as [string, string];
    const when = `${date.split('-').reverse().join('.')} ${time}`;
    const height = comma(
      mean((row) => row.heightM),
      4,
    );
    return `${101 + k};${comma(northingM, 4)};${comma(eastingM, 4)};${height};CHK ${first.mark};${when};${first.satellites}`;
  });
  return `${['Pt;Northing;Easting;Ell. height;Code;Local time;Sats', ...lines].join('\n')}\n`;
}

const localText = (timeMs: number): string =>
  new Date(timeMs + OFFSET_MS).toISOString().slice(0, 19).replace('T', ' ');

/** Rows of one rover on one mark without a pause of more than a minute. */
function occupations(rows: readonly LogRow[]): LogRow[][] {
  const open = new Map<string, LogRow[]>();
  const shots: LogRow[][] = [];
  for (const row of rows) {
    const shot = open.get(row.rover);
    const last = shot?.at(-1);
    if (shot !== undefined && last!.mark === row.mark && row.timeMs - last!.timeMs <= 60_000) {
      if (row.timeMs > last!.timeMs) shot.push(row);
    } else {
      const next = [row];
      open.set(row.rover, next);
      shots.push(next);
    }
  }
  return shots;
}
