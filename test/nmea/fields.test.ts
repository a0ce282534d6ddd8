import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { decimalsOf, degreesOf, timeOfDayMs } from '../../src/logs/nmea/fields.js';
import { readDate } from '../../src/logs/nmea/readDate.js';

const never = (): never => expect.unreachable();

describe('timeOfDayMs', () => {
  it.each([
    ['000000', 0],
    ['123519', 45_319_000],
    ['123519.', 45_319_000],
    ['123519.00', 45_319_000],
    ['123519.2', 45_319_200],
    ['235959.999', 86_399_999],
  ])('%s', (text, ms) => {
    expect(timeOfDayMs(text)).toBe(ms);
  });

  it.each([
    '',
    '12351',
    '1235190',
    '240000',
    '126000',
    '123560',
    '12:35:19',
    '123519,5',
    '123519.x',
    '-12351',
    ' 123519',
  ])('refuses %j', (text) => {
    expect(timeOfDayMs(text)).toBeNaN();
  });

  it('gives whole milliseconds back exactly', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 86_399_999 }), (ms) => {
        const [hours, minutes, seconds, rest] = new Date(ms).toISOString().slice(11, 23).split(/[:.]/);
        expect(timeOfDayMs(`${hours}${minutes}${seconds}.${rest}`)).toBe(ms);
      }),
      { seed: 41, numRuns: 1000 },
    );
  });
});

describe('degreesOf', () => {
  it('has minutes after the degrees', () => {
    // By hand: 48° 7.038' = 48 + 7.038 / 60, 11° 31.000' = 11 + 31 / 60.
    expect(degreesOf('4807.038', 2)).toBeCloseTo(48.1173, 12);
    expect(degreesOf('01131.000', 3)).toBeCloseTo(11.516667, 6);
    expect(degreesOf('01131.000', 3)).toBeCloseTo(11 + 31 / 60, 13);
    expect(degreesOf('0000.00', 2)).toBe(0);
    expect(degreesOf('9000.00', 2)).toBe(90);
    expect(degreesOf('18000.00', 3)).toBe(180);
    expect(degreesOf('4830', 2)).toBe(48.5);
  });

  it.each<[string, 2 | 3]>([
    ['', 2],
    ['4860.000', 2],
    ['9000.001', 2],
    ['807.038', 2],
    ['04807.038', 2],
    ['4807,038', 2],
    ['4807.0.8', 2],
    ['-807.038', 2],
    ['48 7.038', 2],
    ['4807.038e', 2],
    ['18000.001', 3],
    ['1131.000', 3],
    ['011310.00', 3],
  ])('refuses %j', (text, digits) => {
    expect(degreesOf(text, digits)).toBeNaN();
  });

  it('is inverse to writing degrees and minutes, to 1e-8 minutes', () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 179.999, noNaN: true }), (degrees) => {
        const whole = Math.floor(degrees);
        const minutes = Math.min((degrees - whole) * 60, 59.99999999)
          .toFixed(8)
          .padStart(11, '0');
        const text = `${String(whole).padStart(3, '0')}${minutes}`;
        expect(Math.abs(degreesOf(text, 3) - degrees) * 60).toBeLessThan(1.1e-8);
      }),
      { seed: 42, numRuns: 1000 },
    );
  });
});

describe('decimalsOf', () => {
  it.each([
    ['4807.038', 3],
    ['4807.', 0],
    ['4807', 0],
    ['4717.11399', 5],
  ])('%s', (text, decimals) => {
    expect(decimalsOf(text)).toBe(decimals);
  });
});

describe('readDate', () => {
  const rmcDate = (ddmmyy: string): number =>
    readDate('RMC', `GPRMC,123519,A,4807.038,N,01131.000,E,0,0,${ddmmyy},,`.split(','), never);
  const iso = (ms: number): string => new Date(ms).toISOString().slice(0, 10);

  it('puts two-digit years from 80 on into the twentieth century', () => {
    expect(iso(rmcDate('230394'))).toBe('1994-03-23');
    expect(iso(rmcDate('060180'))).toBe('1980-01-06');
    expect(iso(rmcDate('311279'))).toBe('2079-12-31');
    expect(iso(rmcDate('290224'))).toBe('2024-02-29');
  });

  it('reads day, month and year of ZDA', () => {
    expect(iso(readDate('ZDA', 'GPZDA,201530.00,04,07,2002,00,00'.split(','), never))).toBe('2002-07-04');
  });

  it('has no date in blank fields, and in RMC of status V', () => {
    expect(rmcDate('')).toBeNaN();
    expect(readDate('ZDA', 'GPZDA,,,,,00,00'.split(','), never)).toBeNaN();
    expect(readDate('ZDA', ['GPZDA', '201530.00'], never)).toBeNaN();
    expect(readDate('RMC', 'GPRMC,123519,V,,,,,,,060180,,'.split(','), never)).toBeNaN();
  });

  it.each(['300225', '290225', '001224', '011325', '23039', '2303945', '23.394', 'abcdef'])(
    'tells of a date that does not exist: %s',
    (text) => {
      const told: string[] = [];
      const fields = `GPRMC,123519,A,4807.038,N,01131.000,E,0,0,${text},,`.split(',');
      expect(readDate('RMC', fields, (column, came) => told.push(`${column} ${came}`))).toBeNaN();
      expect(told).toEqual([`date ${text}`]);
    },
  );
});
