import type { LogRow } from './epochs.js';

/** The columns of a log's text: names of column roles. */
export const LOG_COLUMNS: readonly string[] =
  'time base mark rover crew latitude longitude height fix satellites pdop age'.split(' ');

/**
 * A log as comma-separated text with a header, one line a row, times in UTC (ISO 8601 with `Z`), lines
 * ended by a line feed. `setupColumn` adds a last column `setup`, which a log needs when a base on a tripod
 * is set up more than once a day.
 */
export function logText(rows: readonly LogRow[], { setupColumn = false } = {}): string {
  const header = [...LOG_COLUMNS, ...(setupColumn ? ['setup'] : [])].join(',');
  return `${[header, ...rows.map((row) => logLine(row) + (setupColumn ? `,${row.setup}` : ''))].join('\n')}\n`;
}

function logLine(row: LogRow): string {
  return [
    new Date(row.timeMs).toISOString().replace('.000Z', 'Z'),
    row.base,
    row.mark,
    row.rover,
    row.crew,
    row.latitudeDeg.toFixed(9),
    row.longitudeDeg.toFixed(9),
    row.heightM.toFixed(4),
    row.fix,
    row.satellites,
    row.pdop.toFixed(1),
    row.ageSeconds.toFixed(1),
  ].join(',');
}

/** The rows by calendar month of their UTC time (`YYYY-MM`), months in order of the rows. */
export function rowsByMonth(rows: readonly LogRow[]): ReadonlyMap<string, readonly LogRow[]> {
  const months = new Map<string, LogRow[]>();
  for (const row of rows) {
    const month = new Date(row.timeMs).toISOString().slice(0, 7);
    const sofar = months.get(month);
    if (sofar === undefined) months.set(month, [row]);
    else sofar.push(row);
  }
  return months;
}
