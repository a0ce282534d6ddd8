import { describe, expect, it } from 'vitest';
import { findSentences } from '../../src/logs/nmea/sentence.js';
import { sentence } from './sentences.js';

/**
 * Sentences of public examples of NMEA 0183; all checksums were formed apart from this project by exclusive or of the
 * bytes.
 */
const VALID: readonly (readonly [string, string, number])[] = [
  ['$GPGGA,123519,4807.038,N,01131.000,E,1,08,0.9,545.4,M,46.9,M,,*47', 'GGA', 15],
  ['$GPRMC,123519,A,4807.038,N,01131.000,E,022.4,084.4,230394,003.1,W*6A', 'RMC', 12],
  ['$GPGSA,A,3,04,05,,09,12,,,24,,,,,2.5,1.3,2.1*39', 'GSA', 18],
  ['$GPGST,172814.0,0.006,0.023,0.020,273.6,0.023,0.020,0.031*6A', 'GST', 9],
  ['$GPZDA,201530.00,04,07,2002,00,00*60', 'ZDA', 7],
  ['$GPGGA,172814.0,3723.46587704,N,12202.26957864,W,2,6,1.2,18.893,M,-25.669,M,2.0,0031*4F', 'GGA', 15],
  ['$GNGGA,092725.00,4717.11399,N,00833.91590,E,4,12,0.61,499.612,M,48.000,M,1.0,0000*60', 'GGA', 15],
];
const [GGA] = VALID[0]!;
const [GST] = VALID[3]!;

const kinds = (line: string): string[] =>
  findSentences(line).map((found) => (found.kind === 'sentence' ? found.type : found.fault));

describe('findSentences', () => {
  it.each(VALID)('%s', (line, type, fields) => {
    expect(findSentences(line)).toEqual([
      { kind: 'sentence', type, fields: line.slice(1, line.indexOf('*')).split(',') },
    ]);
    expect(line.split(',')).toHaveLength(fields);
    // The sentences that tests make up are made right.
    expect(sentence(line.slice(1, -3))).toBe(line);
  });

  it('refuses a sentence from a help page that is printed there with the checksum 42 and has 48', () => {
    const line = '$GPGGA,121505,4807.038,N,01131.324,E,1,08,0.9,133.4,M,46.9,M, , *42';
    expect(findSentences(line)).toEqual([
      {
        kind: 'fault',
        fault: 'checksum',
        type: 'GGA',
        detail: 'expected the checksum "42" that the sentence states, came characters with "48"',
      },
    ]);
  });

  it('reads digits of the checksum in either case', () => {
    expect(kinds(GST)).toEqual(['GST']);
    expect(kinds(GST.replace('*6A', '*6a'))).toEqual(['GST']);
    expect(kinds(GST.replace('*6A', '*6G'))).toEqual(['checksum']);
    expect(kinds(GST.replace('*6A', '*  '))).toEqual(['checksum']);
  });

  it('finds sentences between noise, several in a line and after a broken one', () => {
    expect(kinds(`\u0000\ufffd$\u0003${GGA}\ufffd*12,`)).toEqual(['GGA']);
    expect(kinds(`${GGA}${GST} ${GGA}`)).toEqual(['GGA', 'GST', 'GGA']);
    expect(kinds(`$GPGGA,1235${GGA}`)).toEqual(['truncated', 'GGA']);
    expect(kinds(`$${GGA}`)).toEqual(['GGA']);
    expect(kinds(`2025-03-01 10:00:00 ${GGA}`)).toEqual(['GGA']);
  });

  it('calls a sentence truncated wherever it is cut, and one without its checksum so', () => {
    const star = GGA.indexOf('*');
    for (let length = 6; length < GGA.length; length++) {
      // The last field is empty here: a cut before the star leaves all fields.
      const cut = GGA.slice(0, length);
      expect(kinds(cut), cut).toEqual([length === star ? 'no-checksum' : 'truncated']);
    }
  });

  it('finds no sentence without its beginning', () => {
    expect(kinds('')).toEqual([]);
    expect(kinds(GGA.slice(1))).toEqual([]);
    expect(kinds('$')).toEqual([]);
    expect(kinds('$GPGG')).toEqual([]);
    expect(kinds('price: $5, or $12,50*00')).toEqual([]);
  });

  it.each(['GP', 'GN', 'GL', 'GA', 'GB', 'BD', 'GQ', 'GI', 'II', 'B2'])('understands talker %s', (talker) => {
    expect(kinds(sentence(`${talker}GGA,123519`))).toEqual(['GGA']);
  });

  it('passes over other sentences, whatever their checksum, and those of makers', () => {
    expect(kinds('$GPGSV,3,1,11,03,03,111,00*74')).toEqual(['other-sentence']);
    expect(kinds('$GPGSV,3,1,11,03,03,111,00*00')).toEqual(['other-sentence']);
    expect(kinds(sentence('PXGGA,1,2,3'))).toEqual(['other-sentence']);
    expect(kinds(sentence('GPGGB,1,2,3'))).toEqual(['other-sentence']);
  });

  it('refuses exchanged characters in the address and bytes that are no text', () => {
    // The checksum does not change when two characters change places.
    expect(kinds(sentence('GPGGA1,23519'))).toEqual(['truncated']);
    expect(kinds(sentence('GPGGA,123519,\u00e9'))).toEqual(['checksum']);
    expect(kinds(GGA.replace('4807', '48\ufffd7'))).toEqual(['checksum']);
  });
});
