import { describe, expect, it } from 'vitest';
import { testFolder } from '../files.js';
import { gga, gsa, gst, readSentences, rmc, sentence } from './sentences.js';

const folder = testFolder();
const DATE = { date: '2025-03-01' };

const told = async (lines: readonly string[]): Promise<(readonly (string | number | null)[])[]> =>
  (await readSentences(folder, lines, DATE)).messages.map(
    ({ severity, code, row, column, text }) => [severity, code, row, column, text] as const,
  );

/** Sentences of ten seconds whose minutes have so many decimals. */
const withDecimals = (minutes: number, height = 3): string[] =>
  Array.from({ length: 10 }, (_, s) =>
    gga(`10150${s}`, {
      latitude: `4807.${'1'.repeat(minutes)},N`,
      longitude: `01131.${'1'.repeat(minutes)},E`,
      height: `545.${'1'.repeat(height)}`,
    }),
  );

describe('what is told of an NMEA log', () => {
  it('is nothing where all is well', async () => {
    expect(await told([gga('101500'), gsa('1.1'), rmc('101500', '010325'), '$GPGSV,1,1,00*79', ''])).toEqual(
      [],
    );
  });

  // 1e-5 minutes are 18.6 mm: a minute of arc is 1855.3 m on the equator (semi-axis 6378137 m times π / 10800).
  // Sigma of rounding: step / √12.
  it.each([
    [4, 'warning', 'steps of 186 mm', '54'],
    [5, 'warning', 'steps of 18.6 mm', '5.4'],
    [6, 'info', 'steps of 1.86 mm', '0.54'],
  ])('%i decimals of a minute: %s', async (decimals, severity, steps, sigma) => {
    expect(await told(withDecimals(decimals))).toEqual([
      [
        severity,
        'resolution',
        1,
        'latitude',
        `Expected at least 7 decimals of a minute, came coordinates that have ${decimals} decimals of a minute: ${steps}, in 10 of 10 rows; a constant below ${sigma} mm an axis cannot show. Record more decimals, for rounding is part of every error found here.`,
      ],
    ]);
  });

  it('has nothing on 7 decimals of a minute and 3 of a metre, and tells of 2 of a metre', async () => {
    expect(await told(withDecimals(7, 3))).toEqual([]);
    expect(await told(withDecimals(7, 2))).toEqual([
      [
        'warning',
        'resolution',
        1,
        'height',
        'Expected at least 3 decimals of a metre, came heights that have 2 decimals of a metre: steps of 10 mm, in 10 of 10 rows; a constant below 2.9 mm an axis cannot show. Record more decimals, for rounding is part of every error found here.',
      ],
    ]);
  });

  it('does not take dropped zeros for coarse steps, but a coarse part of the file', async () => {
    const fine = withDecimals(8);
    expect(await told([...fine.slice(1), withDecimals(7)[0]!])).toEqual([]);
    expect(await told([...fine.slice(1), withDecimals(5)[0]!])).toEqual([]);
    expect(await told([...fine.slice(2), ...withDecimals(5).slice(8)])).toMatchObject([
      ['warning', 'resolution', 9, 'latitude', expect.stringContaining('18.6 mm, in 2 of 10 rows')],
    ]);
  });

  it('is each reference station with its first row, of corrected rows only', async () => {
    expect(
      await told([
        gga('101500', { station: '0031' }),
        gga('101501', { quality: '1', station: '0000' }),
        gga('101502', { station: '' }),
        gga('101503', { quality: '5', station: '0042' }),
        gga('101504', { station: '0031' }),
      ]),
    ).toEqual([
      [
        'warning',
        'station-changed',
        4,
        null,
        'Expected corrections of one reference station, came the numbers "0031" from row 1, "0042" from row 4. Check which bases these are, and split the log where the base changes.',
      ],
    ]);
  });

  it('lists five of many reference stations', async () => {
    const lines = Array.from({ length: 9 }, (_, s) => gga(`10150${s}`, { station: `000${s}` }));
    expect((await told(lines))[0]![4]).toContain('"0004" from row 5 and 4 more.');
  });

  it('is how many sentences are damaged', async () => {
    const damaged = rmc('101500', '010325').replace('GNRMC', 'GLRMC');
    expect(await told([gga('101500'), damaged, damaged, gst('101500', '1', '1', '1').slice(0, 20)])).toEqual([
      [
        'warning',
        'wrong-checksum',
        2,
        null,
        'Expected sentences whose checksum holds, came others: 2 sentences are not read. Copy or export the log again when there are many.',
      ],
      [
        'warning',
        'truncated-sentence',
        4,
        null,
        'Expected whole sentences, came parts: 1 sentence is not read. Look for a line to the recorder that was too slow when there are many.',
      ],
    ]);
  });

  it('is that sentences without checksums are not read', async () => {
    expect(await told([gga('101500').slice(0, -3), gst('101500', '1', '1', '1').slice(0, -3)])).toEqual([
      [
        'warning',
        'no-checksum',
        1,
        null,
        'Expected sentences with a checksum, came some without, which may be damaged unseen: 2 sentences are not read. Switch the checksum on and export again.',
      ],
    ]);
  });

  it('is what could not be understood in undamaged sentences', async () => {
    const lines = [
      gga('101500', { satellites: 'x', age: '-1' }),
      gga('101501', { satellites: 'y' }),
      rmc('101501', '310225'),
      gst('1015', '1', '1', '1'),
      gsa('?'),
    ];
    const { positions } = await readSentences(folder, lines, DATE);
    expect(positions.map(({ satellites, ageSeconds, pdop }) => [satellites, ageSeconds, pdop])).toEqual([
      [Number.NaN, Number.NaN, Number.NaN],
      [Number.NaN, 1, Number.NaN],
    ]);
    const all = await told(lines);
    expect(all.map(([severity, code, row, column]) => [severity, code, row, column])).toEqual([
      ['warning', 'unread-value', 1, 'satellites'],
      ['warning', 'unread-value', 1, 'ageSeconds'],
      ['warning', 'unread-value', 3, 'date'],
      ['warning', 'unread-value', 4, 'time'],
      ['warning', 'unread-value', 5, 'pdop'],
    ]);
    expect(all[0]![4]).toBe(
      'Expected a value as NMEA 0183 writes it, came "x": 2 sentences are read without it. Export the log again when there are many.',
    );
  });

  it.each([
    ['an empty file', [], 'none'],
    ['other text', ['time,mark', 'a,b'], 'none and 2 lines of other content'],
    ['other sentences', [sentence('GPGSV,1,1,00')], 'other sentences'],
  ])('is that there is no GGA: %s', async (_, lines, came) => {
    expect(await told(lines)).toEqual([
      [
        'warning',
        'empty-log',
        null,
        null,
        `Expected GGA sentences, came ${came}. Record GGA with RMC and GST as NMEA 0183 text.`,
      ],
    ]);
  });

  it('is that a line was too long', async () => {
    const lines = [gga('101500'), `${gga('101501')}${'x'.repeat(1_000_000)}${gga('101502')}`];
    const { rowsRead } = await readSentences(folder, lines, DATE);
    expect(rowsRead).toBe(2);
    expect((await told(lines)).map(([severity, code, row]) => [severity, code, row])).toEqual([
      ['warning', 'long-line', 2],
    ]);
  });

  it('is in full sentences', async () => {
    const { messages } = await readSentences(folder, [
      'noise',
      gga('101500', { latitude: '4807.0,N', longitude: '01131.0,E', height: '5', satellites: 'x' }),
      gga('101501', { station: '1' }),
      gga('101502').slice(0, 30),
      `${gga('101502').slice(0, -2)}00`,
      gga('101502').slice(0, -3),
      gga('090000'),
    ]);
    expect(messages.map(({ code }) => code)).toEqual([
      'noise',
      'wrong-checksum',
      'no-checksum',
      'truncated-sentence',
      'unread-value',
      'no-date',
      'station-changed',
      'resolution',
      'resolution',
    ]);
    for (const { text } of messages) expect(text).toMatch(/^Expected .+, came .+[^.]\. [A-Z][^.]+\.$/);
  });
});
