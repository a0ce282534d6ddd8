import { closeSync, openSync, writeSync } from 'node:fs';

const MARKS = 12;
const START_MS = Date.UTC(2025, 2, 3, 8);

export const markLatitude = (mark: number): number => 44.3 + 0.02 * (mark + 1);

/** Writes lines to a file in blocks. */
function writeLines(path: string, count: number, line: (k: number) => string): void {
  const file = openSync(path, 'w');
  let text = '';
  for (let k = 0; k < count; k++) {
    text += line(k);
    if (text.length > 1 << 20) {
      writeSync(file, text);
      text = '';
    }
  }
  writeSync(file, text);
  closeSync(file);
}

/** A log with `epochsPerVisit` rows a visit on twelve marks in turn, two minutes apart. */
export function writeDelimitedLog(path: string, rows: number, epochsPerVisit: number): void {
  let time = START_MS;
  writeLines(path, rows + 1, (line) => {
    if (line === 0) return 'time,base,mark,rover,crew,latitude,longitude,height,fix,satellites,pdop,age\n';
    const k = line - 1;
    const mark = Math.floor(k / epochsPerVisit) % MARKS;
    time += k % epochsPerVisit === 0 && k > 0 ? 120_000 : 1000;
    const latitude = (markLatitude(mark) + ((k % 17) - 8) * 1e-8).toFixed(9);
    const height = (133.7 + (k % 13) / 1000).toFixed(4);
    return `${new Date(time).toISOString().slice(0, 19)}Z,B,M${mark},R1,north,${latitude},-18.400700010,${height},fixed,21,1.4,2.0\n`;
  });
}

const checksum = (body: string): string => {
  let sum = 0;
  for (let i = 0; i < body.length; i++) sum ^= body.charCodeAt(i);
  return sum.toString(16).toUpperCase().padStart(2, '0');
};

/** Epochs of GGA, GST and RMC sentences on the first mark; gives the number of sentences. */
export function writeNmeaLog(path: string, epochs: number): number {
  writeLines(path, epochs, (k) => {
    const date = new Date(START_MS + 1000 * k);
    const clock = `${date.toISOString().slice(11, 19).replaceAll(':', '')}.00`;
    const day = `${date.toISOString().slice(8, 10)}${date.toISOString().slice(5, 7)}${date.toISOString().slice(2, 4)}`;
    const latitude = ((markLatitude(0) - 44) * 60 + ((k % 17) - 8) * 6e-7).toFixed(8);
    const place = `44${latitude.padStart(11, '0')},N,01824.04200060,W`;
    const bodies = [
      `GNRMC,${clock},A,${place},0.0,0.0,${day},,,R`,
      `GNGGA,${clock},${place},4,18,0.7,83.7000,M,50.0000,M,1.0,0001`,
      `GNGST,${clock},0.01,0.01,0.01,0,0.008,0.008,0.015`,
    ];
    return `${bodies.map((body) => `$${body}*${checksum(body)}`).join('\r\n')}\r\n`;
  });
  return 3 * epochs;
}
