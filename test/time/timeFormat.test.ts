import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { compileTimeFormat } from '../../src/time/index.js';

const utc = (text: string) => Date.parse(`${text}Z`);
const at = (text: string) => ({ kind: 'date-time', wallMs: utc(text) });
const on = (day: string) => ({ kind: 'date', wallMs: utc(`${day}T00:00:00`) });

describe('compileTimeFormat', () => {
  it.each([
    ['dd.MM.yyyy HH:mm:ss', '13.03.2025 09:05:07', '2025-03-13T09:05:07'],
    ['dd.MM.yyyy HH:mm:ss', '3.3.2025 9:5:7', '2025-03-03T09:05:07'],
    ['d.M.yyyy H:m:s', '13.03.2025 09:05:07', '2025-03-13T09:05:07'],
    ['d.M.yyyy H:m:s', '3.3.2025 9:5:7', '2025-03-03T09:05:07'],
    ['MM/dd/yyyy HH:mm', '3/13/2025 23:59', '2025-03-13T23:59:00'],
    ['yyyy/MM/dd,HH:mm:ss', '2025/03/13,09:05:07', '2025-03-13T09:05:07'],
    ['HH:mm:ss dd/MM/yyyy', '09:05:07 13/03/2025', '2025-03-13T09:05:07'],
    ['yyyyMMddHHmmss', '20250313090507', '2025-03-13T09:05:07'],
    ["yyyyMMdd'T'HHmmss'Z'", '20250313T090507Z', '2025-03-13T09:05:07'],
    ['yyyyMMdd HHmmssSSS', '20250313 090507250', '2025-03-13T09:05:07.250'],
    ['dMMyyyy Hmmss', '3032025 90507', '2025-03-03T09:05:07'],
    ['dMMyyyy Hmmss', '13032025 190507', '2025-03-13T19:05:07'],
    ['yyyy-DDD HH:mm', '2024-366 00:01', '2024-12-31T00:01:00'],
    ["dd.MM.yyyy HH'h'mm", '13.03.2025 09h05', '2025-03-13T09:05:00'],
    ["dd.MM.yyyy 'o''clock' HH", "13.03.2025 o'clock 09", '2025-03-13T09:00:00'],
    ["dd.MM.yyyy '' HH", "13.03.2025 ' 09", '2025-03-13T09:00:00'],
  ])('%s reads %s', (format, text, expected) => {
    expect(compileTimeFormat(format)(text)).toEqual(at(expected));
  });

  it.each([
    ['dd.MM.yyyy HH:mm:ss', '31.04.2025 10:00:00'],
    ['dd.MM.yyyy HH:mm:ss', '29.02.2025 10:00:00'],
    ['dd.MM.yyyy HH:mm:ss', '00.03.2025 10:00:00'],
    ['dd.MM.yyyy HH:mm:ss', '13.13.2025 10:00:00'],
    ['dd.MM.yyyy HH:mm:ss', '13.03.2025 24:00:00'],
    ['dd.MM.yyyy HH:mm:ss', '13.03.2025 10:60:00'],
    ['dd.MM.yyyy HH:mm:ss', '13.03.2025 23:59:60'],
    ['dd.MM.yyyy HH:mm:ss', '13.03.25 10:00:00'],
    ['dd.MM.yyyy HH:mm:ss', '13.03.02025 10:00:00'],
    ['dd.MM.yyyy HH:mm:ss', '113.03.2025 10:00:00'],
    ['dd.MM.yyyy HH:mm:ss', '13.03.2025 10:00'],
    ['dd.MM.yyyy HH:mm:ss', '13.03.2025 10:00:00.5'],
    ['dd.MM.yyyy HH:mm:ss', '13.03.2025 10:00:00Z'],
    ['dd.MM.yyyy HH:mm:ss', ' 13.03.2025 10:00:00'],
    ['dd.MM.yyyy HH:mm:ss', '13.03.202510:00:00'],
    ['dd.MM.yyyy HH:mm:ss', '13-03-2025 10:00:00'],
    ['dd.MM.yyyy HH:mm:ss', ''],
    ['yyyyMMddHHmmss', '2025031390507'],
    ['Hmmss', '0507'],
    ['Hmmss', '1190507'],
    ['yyyy-DDD', '2025-366'],
    ['yyyy-DDD', '2025-000'],
    ['HH:mm', '1O:15'],
  ])('%s does not read "%s"', (format, text) => {
    expect(compileTimeFormat(format)(text)).toBeNull();
  });

  it('a run of blanks of any kind is a blank', () => {
    const read = compileTimeFormat('dd.MM.yyyy HH:mm');
    for (const blanks of ['  ', '\t', ' \u00a0\u202f\u2009'])
      expect(read(`13.03.2025${blanks}09:05`), JSON.stringify(blanks)).toEqual(at('2025-03-13T09:05:00'));
    expect(compileTimeFormat('dd.MM.yyyy   HH:mm')('13.03.2025 09:05')).toEqual(at('2025-03-13T09:05:00'));
  });

  it('reads fractions of any length after the separator of the format', () => {
    const read = compileTimeFormat('yyyy-MM-dd HH:mm:ss.SSS');
    const second = (fraction: string) => read(`2025-03-01 10:15:00${fraction}`);
    expect(second('.5')).toEqual(at('2025-03-01T10:15:00.500'));
    expect(second('.123')).toEqual(at('2025-03-01T10:15:00.123'));
    expect(second('.5000000000000000000000')).toEqual(at('2025-03-01T10:15:00.500'));
    // doubles of this size step by 2^-12 ms
    expect(second('.1234567')!.wallMs - utc('2025-03-01T10:15:00')).toBeCloseTo(123.4567, 3);
    // whole seconds are often written without
    expect(second('')).toEqual(at('2025-03-01T10:15:00'));
    expect(second('.')).toBeNull();
    expect(second(',5')).toBeNull();
    expect(compileTimeFormat('HH:mm:ss,S')('10:15:00,25')).toEqual({
      kind: 'time-of-day',
      wallMs: 36_900_250,
    });
    expect(compileTimeFormat('HHmmssSSS')('101500')).toBeNull();
  });

  it('says whether a date or a time of day is all there is', () => {
    expect(compileTimeFormat('dd.MM.yyyy')('13.03.2025')).toEqual(on('2025-03-13'));
    expect(compileTimeFormat('HH:mm')('09:05')).toEqual({ kind: 'time-of-day', wallMs: 545 * 60_000 });
  });

  it('one text leaves nothing behind for the next', () => {
    const read = compileTimeFormat('yyyy-MM-dd HH:mm:ss.SSS');
    read('2025-12-31 23:59:59.999');
    expect(read('2025-03-01 00:00:00')).toEqual(at('2025-03-01T00:00:00'));
    read('2025-12-31 23:59:59.x');
    expect(read('2025-03-01 00:00:00')).toEqual(at('2025-03-01T00:00:00'));
  });
});

describe('12-hour clock', () => {
  // common practice: 12 AM is midnight, 12 PM is noon
  it.each([
    ['12:00 AM', 0],
    ['12:59 AM', 0],
    ['1:00 AM', 1],
    ['11:00 am', 11],
    ['12:00 PM', 12],
    ['12:59 p.m.', 12],
    ['01:00 pm', 13],
    ['11:59 P.M.', 23],
    ['11:59\u202fPM', 23],
    ['11:59 p.m', 23],
  ])('%s is in hour %i', (text, hour) => {
    expect(Math.floor(compileTimeFormat('hh:mm a')(text)!.wallMs / 3_600_000)).toBe(hour);
  });
  it.each(['0:30 AM', '13:00 PM', '00:00 PM', '10:00', '10:00 XM', '10:00 P', '10:00PM'])(
    '%s is no time of it',
    (text) => {
      expect(compileTimeFormat('hh:mm a')(text)).toBeNull();
    },
  );
  it('AM or PM may stand anywhere', () => {
    expect(compileTimeFormat('a hh:mm')('PM 01:30')).toEqual({
      kind: 'time-of-day',
      wallMs: 13.5 * 3_600_000,
    });
    expect(compileTimeFormat('hh:mma')('1:30pm')).toEqual({ kind: 'time-of-day', wallMs: 13.5 * 3_600_000 });
  });
});

describe('years of two digits', () => {
  it('the century is stated in the format and not in the text', () => {
    expect(compileTimeFormat("dd.MM.'20'yy HH:mm")('13.03.25 09:05')).toEqual(at('2025-03-13T09:05:00'));
    expect(compileTimeFormat("'19'yyMMdd")('991231')).toEqual(on('1999-12-31'));
    expect(compileTimeFormat("dd.MM.'20'yy")('13.03.2025')).toBeNull();
    expect(compileTimeFormat("dd.MM.'20'yyyy")('13.03.202025')).toEqual(on('2025-03-13'));
  });
  it('without a century they are refused', () => {
    expect(() => compileTimeFormat('dd.MM.yy')).toThrow(
      new Error(
        `format: expected a four-digit year yyyy, or its century stated as in '20'yy, came "yy" in "dd.MM.yy"`,
      ),
    );
  });
});

describe('month names', () => {
  // English names, their three-letter forms and Sept: common practice
  const names = 'January February March April May June July August September October November December'.split(
    ' ',
  );
  it('three letters or full, in any case', () => {
    const read = compileTimeFormat('d MMM yyyy');
    for (const [i, name] of names.entries())
      for (const text of [
        name,
        name.toUpperCase(),
        name.toLowerCase(),
        name.slice(0, 3),
        name.slice(0, 3).toUpperCase(),
      ])
        expect(read(`1 ${text} 2025`), text).toEqual({ kind: 'date', wallMs: Date.UTC(2025, i, 1) });
    expect(read('1 Sept 2025')).toEqual(on('2025-09-01'));
    for (const text of ['Ma', 'Marc', 'Mars', '03', '', 'constructor'])
      expect(read(`1 ${text} 2025`), text).toBeNull();
  });
  it('with other parts beside them', () => {
    expect(compileTimeFormat('ddMMMyyyy')('13MAR2025')).toEqual(on('2025-03-13'));
    expect(compileTimeFormat('MMM d, yyyy h:mm:ss a')('Mar 3, 2025 1:05:07 PM')).toEqual(
      at('2025-03-03T13:05:07'),
    );
    expect(compileTimeFormat('d-MMM-yyyy')('31-Apr-2025')).toBeNull();
  });
});

describe('day-of-year', () => {
  const read = compileTimeFormat('day-of-year');
  // day 60 is 1 March of a common year and 29 February of a leap year (common practice)
  it.each([
    ['2025-061 10:15:00', at('2025-03-02T10:15:00')],
    ['2025 061 10 15 00', at('2025-03-02T10:15:00')],
    ['2025:061:10:15:00.25', at('2025-03-02T10:15:00.250')],
    ['2025-061T10:15', at('2025-03-02T10:15:00')],
    ['2025061', on('2025-03-02')],
    ['2025/060', on('2025-03-01')],
    ['2024/060', on('2024-02-29')],
    ['2024-366', on('2024-12-31')],
    ['2000-366', on('2000-12-31')],
    ['2025-365', on('2025-12-31')],
    ['2025-001', on('2025-01-01')],
  ])('%s', (text, expected) => {
    expect(read(text)).toEqual(expected);
  });
  it.each([
    '2025-366',
    '1900-366',
    '2025-000',
    '2025-61',
    '2025-061 10',
    '2025-061 24:00',
    '2025-061 10:15:00Z',
    '2025-10-15',
  ])('does not read %s', (text) => {
    expect(read(text)).toBeNull();
  });
  it('is what the calendar says, for any day', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 47_481 }), (days) => {
        const date = new Date(days * 86_400_000);
        const year = date.getUTCFullYear();
        const dayOfYear = (date.getTime() - Date.UTC(year, 0, 1)) / 86_400_000 + 1;
        const expected = { kind: 'date', wallMs: date.getTime() };
        expect(read(`${year}-${String(dayOfYear).padStart(3, '0')}`)).toEqual(expected);
        expect(compileTimeFormat('yyyyDDD')(`${year}${String(dayOfYear).padStart(3, '0')}`)).toEqual(
          expected,
        );
        expect(compileTimeFormat('yyyy.DDD')(`${year}.${dayOfYear}`)).toEqual(expected);
      }),
      { seed: 34, numRuns: 500 },
    );
  });
});

describe('excel', () => {
  const read = compileTimeFormat('excel');
  // values that spreadsheets show: common knowledge
  it.each([
    ['45658', on('2025-01-01')],
    ['45658.0', at('2025-01-01T00:00:00')],
    ['45658.5', at('2025-01-01T12:00:00')],
    ['45658,25', at('2025-01-01T06:00:00')],
    ['36526', on('2000-01-01')],
    ['25569', on('1970-01-01')],
    ['61', on('1900-03-01')],
    // 1 s = 1.1574074e-5 days
    ['45658.000011574', at('2025-01-01T00:00:01')],
    ['45658.999999999999', at('2025-01-02T00:00:00')],
    ['2958465', on('9999-12-31')],
  ])('%s', (text, expected) => {
    expect(read(text)).toEqual(expected);
  });
  it.each(['60', '60.9', '0', '-1', '2958466', '45658.', '.5', '4.5658e4', '45 658', '', 'x'])(
    'refuses "%s"',
    (text) => {
      expect(read(text)).toBeNull();
    },
  );
  it('gives the millisecond back that 10 decimals hold', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 61, max: 80_000 }),
        fc.integer({ min: 0, max: 86_399_999 }),
        (day, ms) => {
          const fraction = (ms / 86_400_000).toFixed(10).slice(1);
          expect(read(`${day}${fraction}`)).toEqual({
            kind: 'date-time',
            // 25569 is 1970-01-01
            wallMs: (day - 25_569) * 86_400_000 + ms,
          });
        },
      ),
      { seed: 35, numRuns: 1000 },
    );
  });
});

describe('round trips', () => {
  const pad = (value: number, width = 2) => String(value).padStart(width, '0');
  const months = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];
  /** Independent writers of some formats, from the run-time's own calendar. */
  const writers: Readonly<Record<string, (t: Date) => string>> = {
    'dd.MM.yyyy HH:mm:ss.SSS': (t) =>
      `${pad(t.getUTCDate())}.${pad(t.getUTCMonth() + 1)}.${t.getUTCFullYear()} ${t.toISOString().slice(11, 23)}`,
    'M/d/yyyy h:mm:ss.SSS a': (t) =>
      `${t.getUTCMonth() + 1}/${t.getUTCDate()}/${t.getUTCFullYear()} ${t.getUTCHours() % 12 || 12}:${pad(t.getUTCMinutes())}:${pad(t.getUTCSeconds())}.${pad(t.getUTCMilliseconds(), 3)} ${t.getUTCHours() < 12 ? 'AM' : 'PM'}`,
    'dd-MMM-yyyy HH:mm:ss,SSS': (t) =>
      `${pad(t.getUTCDate())}-${months[t.getUTCMonth()]}-${t.getUTCFullYear()} ${t.toISOString().slice(11, 23).replace('.', ',')}`,
    yyyyMMddHHmmssSSS: (t) => t.toISOString().replaceAll(/\D/g, ''),
    "yyyy-MM-dd'T'HH:mm:ss.SSS'Z'": (t) => t.toISOString(),
    "Hmmss.SSS MM'20'yydd": (t) =>
      `${t.getUTCHours()}${t.toISOString().slice(14, 23).replace(':', '')} ${pad(t.getUTCMonth() + 1)}${pad(t.getUTCFullYear() % 100)}${pad(t.getUTCDate())}`,
  };
  it.each(Object.keys(writers))('%s', (format) => {
    const read = compileTimeFormat(format);
    fc.assert(
      fc.property(
        fc.date({
          min: new Date('2000-01-01T00:00:00Z'),
          max: new Date('2099-12-31T23:59:59Z'),
          noInvalidDate: true,
        }),
        (time) => {
          expect(read(writers[format]!(time))).toEqual({ kind: 'date-time', wallMs: time.getTime() });
        },
      ),
      { seed: 36, numRuns: 1000 },
    );
  });
});

describe('formats that cannot be meant', () => {
  const tokens = "yyyy '20'yy M MM MMM d dd DDD H HH h hh m mm s ss SSS a";
  it.each([
    ['YYYY-MM-dd', `the tokens ${tokens} (other letters and digits as 'text'), came "YYYY" in "YYYY-MM-dd"`],
    [
      'yyyy-MM-ddTHH:mm',
      `the tokens ${tokens} (other letters and digits as 'text'), came "T" in "yyyy-MM-ddTHH:mm"`,
    ],
    ['yyyy-MM-DD', `the tokens ${tokens} (other letters and digits as 'text'), came "DD" in "yyyy-MM-DD"`],
    [
      'yyyyy-MM-dd',
      `the tokens ${tokens} (other letters and digits as 'text'), came "yyyyy" in "yyyyy-MM-dd"`,
    ],
    [
      'yyyy-MM-dd 10:mm',
      `the tokens ${tokens} (other letters and digits as 'text'), came "1" in "yyyy-MM-dd 10:mm"`,
    ],
    ["yyyy-MM-dd'T", `a closing ' after the text in quotes, came "'" in "yyyy-MM-dd'T"`],
    ['ddMyyyy', 'MM, as numbers stand directly beside it, came "M" in "ddMyyyy"'],
    ['yyyyMd', 'MM, as numbers stand directly beside it, came "M" in "yyyyMd"'],
    ['HmmssSSS', 'HH, as numbers stand directly beside it, came "H" in "HmmssSSS"'],
    [
      'HH:mm:ss.SSSyyyyMMdd',
      'no number directly after a fraction of seconds, whose length is open, came "SSSyyyy" in "HH:mm:ss.SSSyyyyMMdd"',
    ],
    ['dd.MM', 'a year yyyy in a date, came "dd.MM"'],
    ['MM/yyyy', 'either month and day or the day of the year DDD beside the year, came "MM/yyyy"'],
    ['yyyy-MM-DDD', 'either month and day or the day of the year DDD beside the year, came "yyyy-MM-DDD"'],
    ['yyyy-mm-dd', 'either month and day or the day of the year DDD beside the year, came "yyyy-mm-dd"'],
    ['hh:mm', 'AM or PM (a) with the 12-hour clock (hh), and neither with HH, came "hh:mm"'],
    ['HH:mm a', 'AM or PM (a) with the 12-hour clock (hh), and neither with HH, came "HH:mm a"'],
    ['HH hh a', 'either HH or hh, came "HH hh a"'],
    ['mm:ss', 'an hour beside the minute, came "mm:ss"'],
    ['HH ss', 'a minute beside the second, came "HH ss"'],
    ['HH:mm.SSS', 'a second beside its fraction, came "HH:mm.SSS"'],
    ['HH:mm:mm', 'every part of a time once, came "HH:mm:mm"'],
    ['', 'a date or an hour, came ""'],
    ['--', 'a date or an hour, came "--"'],
  ])('%s', (format, expected) => {
    expect(() => compileTimeFormat(format)).toThrow(new Error(`format: expected ${expected}`));
  });
});
