import type { Position } from '../../src/logs/index.js';
import { type NmeaLog, readNmea } from '../../src/logs/nmea/readNmea.js';
import { collect, type TestFolder, type WholeLog } from '../files.js';

/** A sentence of NMEA 0183 with its checksum, formed independently of the reader: over bytes, by reduce. */
export function sentence(content: string): string {
  const xor = [...Buffer.from(content, 'latin1')].reduce((sum, byte) => sum ^ byte, 0);
  return `$${content}*${xor < 16 ? '0' : ''}${xor.toString(16).toUpperCase()}`;
}

export interface GgaParts {
  readonly latitude?: string;
  readonly longitude?: string;
  readonly quality?: string;
  readonly satellites?: string;
  readonly height?: string;
  readonly separation?: string;
  readonly age?: string;
  readonly station?: string;
}

/** A fixed position at a time of day; parts that are given replace the usual ones. */
export function gga(time: string, parts: GgaParts = {}): string {
  const { latitude = '4807.03812345,N', longitude = '01131.00012345,E', quality = '4' } = parts;
  const {
    satellites = '12',
    height = '545.400',
    separation = '46.900',
    age = '1.0',
    station = '0031',
  } = parts;
  return sentence(
    `GNGGA,${time},${latitude},${longitude},${quality},${satellites},0.6,${height},M,${separation},M,${age},${station}`,
  );
}

export const rmc = (time: string, ddmmyy: string, status = 'A'): string =>
  sentence(`GNRMC,${time},${status},4807.038,N,01131.000,E,0.0,0.0,${ddmmyy},,,R`);

export const zda = (time: string, date: string): string => sentence(`GPZDA,${time},${date},00,00`);

export const gst = (time: string, latitudeM: string, longitudeM: string, heightM: string): string =>
  sentence(`GNGST,${time},0.006,0.023,0.020,273.6,${latitudeM},${longitudeM},${heightM}`);

export const gsa = (pdop: string, talker = 'GN'): string =>
  sentence(`${talker}GSA,A,3,04,05,,09,12,,,24,,,,,${pdop},1.3,2.1`);

/** Reads sentences or other text as a log; lines end with CRLF as in the standard. */
export async function readSentences(
  folder: TestFolder,
  content: readonly string[] | Uint8Array,
  options: Partial<Pick<NmeaLog, 'date' | 'mostHeld'>> = {},
): Promise<WholeLog> {
  const text = content instanceof Uint8Array ? content : content.map((line) => `${line}\r\n`).join('');
  const path = folder.write('rover.nmea', text);
  return collect(readNmea({ path, file: 'rover.nmea', date: null, ...options }));
}

/** Times of positions as ISO text. */
export const times = (positions: readonly Position[]): string[] =>
  positions.map(({ utcMs }) => new Date(utcMs).toISOString());
