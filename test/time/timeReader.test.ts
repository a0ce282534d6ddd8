import { describe, expect, it } from 'vitest';
import { type TimeLayout, timeReader } from '../../src/time/index.js';

const instant = (text: string) => ({ kind: 'instant', utcMs: Date.parse(text) });
const invalid = (detail: string) => ({ kind: 'invalid', detail });

describe('timeReader', () => {
  it('without a format reads ISO 8601', () => {
    for (const layout of [{}, { format: 'iso' }]) {
      const read = timeReader(layout, 'Europe/Oslo');
      expect(read('2025-03-01T10:15:00Z')).toEqual(instant('2025-03-01T10:15:00Z'));
      expect(read('2025-03-01 10:15:00.25-03:30')).toEqual(instant('2025-03-01T13:45:00.250Z'));
      // Oslo: one hour ahead in winter, two in summer (directive 2000/84/EC)
      expect(read('2025-03-01 10:15')).toEqual(instant('2025-03-01T09:15:00Z'));
      expect(read('2025-07-01 10:15')).toEqual(instant('2025-07-01T08:15:00Z'));
      expect(read('2025-03-01')).toEqual({ kind: 'date', day: '2025-03-01' });
    }
  });
  it.each<[TimeLayout, string | null, string, string]>([
    [{ format: 'dd.MM.yyyy HH:mm:ss' }, 'Europe/Oslo', '01.07.2025 10:15:00', '2025-07-01T08:15:00Z'],
    [
      { format: 'dd.MM.yyyy HH:mm:ss', zone: 'UTC' },
      'Europe/Oslo',
      '01.07.2025 10:15:00',
      '2025-07-01T10:15:00Z',
    ],
    [{ zone: 'utc' }, null, '2025-07-01 10:15:00', '2025-07-01T10:15:00Z'],
    [{ zone: '+02:00' }, null, '2025-07-01 10:15:00', '2025-07-01T08:15:00Z'],
    [{ zone: '-3' }, null, '2025-07-01 10:15:00', '2025-07-01T13:15:00Z'],
    [{ zone: '\u22123' }, null, '2025-07-01 10:15:00', '2025-07-01T13:15:00Z'],
    [{ zone: '-0330' }, null, '2025-07-01 10:15:00', '2025-07-01T13:45:00Z'],
    [{ zone: '+5:45' }, null, '2025-07-01 10:15:00', '2025-07-01T04:30:00Z'],
    [{ zone: 'Asia/Kathmandu' }, null, '2025-07-01 10:15:00', '2025-07-01T04:30:00Z'],
    [{}, '+02:00', '2025-07-01 10:15:00', '2025-07-01T08:15:00Z'],
    [{ zone: '+02:00' }, null, '2025-07-01 10:15:00Z', '2025-07-01T10:15:00Z'],
    [{ format: 'excel', zone: 'UTC' }, null, '45658.5', '2025-01-01T12:00:00Z'],
    [{ format: 'day-of-year', zone: 'UTC' }, null, '2025-061 10:15:00', '2025-03-02T10:15:00Z'],
  ])('%o with %s reads %s', (layout, defaultZone, text, expected) => {
    expect(timeReader(layout, defaultZone)(text)).toEqual(instant(expected));
  });
  it('takes the leap seconds off GPS time, whatever the zone of the study', () => {
    // GPS − UTC: 18 s since 2017 (IERS Bulletin C)
    const read = timeReader({ scale: 'gps' }, 'Europe/Oslo');
    expect(read('2025-07-01 10:15:18')).toEqual(instant('2025-07-01T10:15:00Z'));
    expect(read('2025-07-01 10:15:18Z')).toEqual(instant('2025-07-01T10:15:00Z'));
    expect(timeReader({ scale: 'gps' }, null)('2016-07-01 10:15:17')).toEqual(
      instant('2016-07-01T10:15:00Z'),
    );
    expect(timeReader({ scale: 'gps', zone: 'Europe/Oslo' }, null)('2025-07-01 12:15:18')).toEqual(
      instant('2025-07-01T10:15:00Z'),
    );
    expect(timeReader({ scale: 'utc' }, 'UTC')('2025-07-01 10:15:18')).toEqual(
      instant('2025-07-01T10:15:18Z'),
    );
  });
  it('a date alone stays a date', () => {
    expect(timeReader({ format: 'dd.MM.yyyy' }, null)('13.03.2025')).toEqual({
      kind: 'date',
      day: '2025-03-13',
    });
    expect(timeReader({ format: 'day-of-year', scale: 'gps' }, null)('2025-061')).toEqual({
      kind: 'date',
      day: '2025-03-02',
    });
    expect(timeReader({ format: 'excel' }, null)('45658')).toEqual({ kind: 'date', day: '2025-01-01' });
  });
  it('says what it expected', () => {
    expect(timeReader({}, 'UTC')('noon')).toEqual(
      invalid('expected a time like 2025-03-01T10:15:00Z, came "noon"'),
    );
    expect(timeReader({ format: 'dd.MM.yyyy HH:mm' }, 'UTC')('31.04.2025 10:15')).toEqual(
      invalid('expected a time written dd.MM.yyyy HH:mm, came "31.04.2025 10:15"'),
    );
    expect(timeReader({ format: 'excel' }, 'UTC')('60')).toEqual(
      invalid('expected a serial number of days from 61 (1900-03-01) on like 45717.4271, came "60"'),
    );
    expect(timeReader({ format: 'day-of-year' }, 'UTC')('2025-366')).toEqual(
      invalid('expected a year and day of the year like 2025-061 10:15:00, came "2025-366"'),
    );
    expect(timeReader({}, 'UTC')('x'.repeat(100))).toEqual(
      invalid(`expected a time like 2025-03-01T10:15:00Z, came "${'x'.repeat(60)}"…`),
    );
  });
  it('says to name the zone', () => {
    expect(timeReader({}, null)('2025-03-01 10:15')).toEqual(
      invalid(
        'expected a time with Z or an offset, came "2025-03-01 10:15"; name the timeZone of such times in the study file',
      ),
    );
  });
  it('refuses times that a change of clocks skips or repeats', () => {
    const read = timeReader({ format: 'dd.MM.yyyy HH:mm' }, 'Europe/Oslo');
    expect(read('30.03.2025 02:30')).toEqual(
      invalid(
        'expected a time that exists in Europe/Oslo, came "30.03.2025 02:30", which the change of clocks skips',
      ),
    );
    expect(read('26.10.2025 02:30')).toEqual(
      invalid(
        'expected a time that is unique in Europe/Oslo, came "26.10.2025 02:30", which the change of clocks repeats; write an offset',
      ),
    );
  });
  it('refuses years that no log comes from', () => {
    const otherYear = (came: string) => invalid(`expected a time in the years 1980 to 2099, came "${came}"`);
    const read = timeReader({}, 'UTC');
    for (const came of ['0000-01-01', '1979-12-31 23:59', '2100-01-01T00:00:00Z', '1899-12-30T00:00'])
      expect(read(came)).toEqual(otherYear(came));
    expect(timeReader({ scale: 'gps', zone: '+02:00' }, null)('1980-01-01 00:30')).toEqual(
      otherYear('1980-01-01 00:30'),
    );
    expect(timeReader({ format: 'excel' }, 'UTC')('61.5')).toEqual(otherYear('61.5'));
  });
  it.each<[TimeLayout, string | null, string]>([
    [
      { zone: 'Europe/Atlantis' },
      null,
      'zone: expected an IANA time zone like Europe/Lisbon or an offset from UTC like +02:00, came "Europe/Atlantis"',
    ],
    [
      { zone: '+17' },
      null,
      'zone: expected an IANA time zone like Europe/Lisbon or an offset from UTC like +02:00, came "+17"',
    ],
    [
      { zone: '+02:60' },
      null,
      'zone: expected an IANA time zone like Europe/Lisbon or an offset from UTC like +02:00, came "+02:60"',
    ],
    [
      {},
      '',
      'zone: expected an IANA time zone like Europe/Lisbon or an offset from UTC like +02:00, came ""',
    ],
    [
      { format: 'HH:mm' },
      'UTC',
      'format: expected one with a date (join the date column to it), came "HH:mm"',
    ],
    [{ scale: 'tai' as 'gps' }, 'UTC', 'scale: expected utc or gps, came "tai"'],
  ])('%o with %s is refused', (layout, defaultZone, expected) => {
    expect(() => timeReader(layout, defaultZone)).toThrow(new Error(expected));
  });
});
