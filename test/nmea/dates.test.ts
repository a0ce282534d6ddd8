import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { testFolder } from '../files.js';
import { gga, gst, readSentences, rmc, times, zda } from './sentences.js';

const folder = testFolder();
const DAY_MS = 86_400_000;

describe('dates of rows', () => {
  it('come from RMC, before or after GGA in the block', async () => {
    const { positions } = await readSentences(folder, [
      rmc('101500.00', '010325'),
      gga('101500.00'),
      gga('101501.00'),
      rmc('101501.00', '010325'),
    ]);
    expect(times(positions)).toEqual(['2025-03-01T10:15:00.000Z', '2025-03-01T10:15:01.000Z']);
  });

  it('do not depend on the decimals in which sentences write their time', async () => {
    const { positions } = await readSentences(folder, [gga('101500.20'), rmc('101500.2', '010325')]);
    expect(times(positions)).toEqual(['2025-03-01T10:15:00.200Z']);
  });

  it('are carried on over midnight and the end of a month, also of a leap February', async () => {
    const { positions } = await readSentences(folder, [
      rmc('235958.00', '280224'),
      gga('235958.00'),
      gga('235959.50'),
      gga('000000.00'),
      gga('120000.00'),
      gga('235900.00'),
      gga('000001.00'),
    ]);
    expect(times(positions)).toEqual([
      '2024-02-28T23:59:58.000Z',
      '2024-02-28T23:59:59.500Z',
      '2024-02-29T00:00:00.000Z',
      '2024-02-29T12:00:00.000Z',
      '2024-02-29T23:59:00.000Z',
      '2024-03-01T00:00:01.000Z',
    ]);
  });

  it('reach back to rows before a ZDA further down, also over midnight', async () => {
    const { positions, setAside, messages } = await readSentences(folder, [
      gga('235958.00'),
      gga('000001.00'),
      gga('000002.00'),
      zda('000003.00', '01,01,2026'),
      gga('000003.00'),
    ]);
    expect(times(positions)).toEqual([
      '2025-12-31T23:59:58.000Z',
      '2026-01-01T00:00:01.000Z',
      '2026-01-01T00:00:02.000Z',
      '2026-01-01T00:00:03.000Z',
    ]);
    expect(setAside).toEqual([]);
    expect(messages).toEqual([]);
  });

  it('change where a date is stated anew, without a fall of the time of day', async () => {
    const { positions } = await readSentences(folder, [
      rmc('101500.00', '010325'),
      gga('101500.00'),
      rmc('113000.00', '050325'),
      gga('113000.00'),
      gga('113001.00'),
    ]);
    expect(times(positions).map((time) => time.slice(0, 10))).toEqual([
      '2025-03-01',
      '2025-03-05',
      '2025-03-05',
    ]);
  });

  it('are told apart at the same time of two days', async () => {
    for (const order of [
      [gga('101500'), rmc('101500', '010325'), gga('101500'), rmc('101500', '020325')],
      [rmc('101500', '010325'), gga('101500'), rmc('101500', '020325'), gga('101500')],
    ]) {
      const { positions } = await readSentences(folder, order);
      expect(times(positions)).toEqual(['2025-03-01T10:15:00.000Z', '2025-03-02T10:15:00.000Z']);
    }
  });

  it('do not reach over a fall of the time of day that is no midnight', async () => {
    // 14 h → 9 h: either of another day or joined in the wrong order; nothing says which.
    const { positions, setAside, messages } = await readSentences(folder, [
      rmc('140000.00', '010325'),
      gga('140000.00'),
      gga('090000.00'),
      gga('090001.00'),
    ]);
    expect(times(positions)).toEqual(['2025-03-01T14:00:00.000Z']);
    expect(setAside.map(({ row, reason }) => [row, reason])).toEqual([
      [3, 'outside-study'],
      [4, 'outside-study'],
    ]);
    expect(messages.map(({ code, row }) => [code, row])).toEqual([['no-date', 3]]);

    const dated = await readSentences(folder, [
      rmc('140000.00', '010325'),
      gga('140000.00'),
      gga('090000.00'),
      rmc('090001.00', '040325'),
    ]);
    expect(times(dated.positions)).toEqual(['2025-03-01T14:00:00.000Z', '2025-03-04T09:00:00.000Z']);
  });

  it('stay when the clock steps back by leap seconds', async () => {
    const { positions } = await readSentences(folder, [
      rmc('101518.00', '010325'),
      gga('101518.00'),
      gga('101500.00'),
      gga('101501.00'),
    ]);
    expect(times(positions)[2]).toBe('2025-03-01T10:15:01.000Z');
  });

  it('are not believed in RMC of status V, which tells the first day a receiver knows', async () => {
    const { positions } = await readSentences(folder, [
      gga('101500.00'),
      rmc('101500.00', '060180', 'V'),
      gga('101501.00'),
      rmc('101501.00', '010325'),
    ]);
    expect(times(positions).map((time) => time.slice(0, 10))).toEqual(['2025-03-01', '2025-03-01']);
  });

  it('missing everywhere, rows are set aside with what to do', async () => {
    const { rowsRead, positions, setAside, messages } = await readSentences(folder, [
      gga('101500.00'),
      gst('101500.00', '0.01', '0.01', '0.02'),
    ]);
    expect(rowsRead).toBe(1);
    expect(positions).toEqual([]);
    expect(setAside).toEqual([
      {
        file: 'rover.nmea',
        row: 1,
        reason: 'outside-study',
        column: 'date',
        detail:
          'expected a date from RMC, ZDA, the layout or the file name, came none; state the date in the constants of the layout or in the file name',
      },
    ]);
    expect(messages.map(({ text }) => text)).toEqual([
      'Expected a date for every row from valid RMC or ZDA sentences, came a time of day alone: 1 row has no date. State the date in the constants of the layout or in the file name.',
    ]);
  });

  it('come from the option when no sentence states one, and go on over midnight', async () => {
    const lines = [gga('235959.00'), gga('000000.00'), gga('080000.00'), gga('070000.00')];
    const { positions, setAside, messages } = await readSentences(folder, lines, { date: '2025-02-28' });
    expect(times(positions)).toEqual([
      '2025-02-28T23:59:59.000Z',
      '2025-03-01T00:00:00.000Z',
      '2025-03-01T08:00:00.000Z',
      '2025-03-01T07:00:00.000Z',
    ]);
    expect(setAside).toEqual([]);
    expect(messages).toEqual([]);
  });

  it('in sentences go before the option, and more than a day of difference is told', async () => {
    const lines = [gga('101500.00'), rmc('101501.00', '010325'), gga('101501.00')];
    const near = await readSentences(folder, lines, { date: '2025-02-28' });
    expect(times(near.positions)).toEqual(['2025-03-01T10:15:00.000Z', '2025-03-01T10:15:01.000Z']);
    expect(near.messages).toEqual([]);
    const far = await readSentences(folder, lines, { date: '2025-03-03' });
    expect(times(far.positions)).toEqual(times(near.positions));
    expect(far.messages.map(({ code, text }) => [code, text])).toEqual([
      [
        'date-differs',
        'Expected the date of the layout or the file name, came one 2 days earlier in the sentences: the sentences are believed. Correct the one that is wrong.',
      ],
    ]);
  });

  it('are waited for by a bounded number of rows', async () => {
    const lines = [...[0, 1, 2, 3, 4].map((s) => gga(`10150${s}.00`)), rmc('101505.00', '010325')];
    const { positions, setAside } = await readSentences(folder, lines, { mostHeld: 3 });
    expect(setAside.map(({ row }) => row)).toEqual([1, 2, 3, 4]);
    expect(positions.map(({ row }) => row)).toEqual([5]);
    expect((await readSentences(folder, lines, { mostHeld: 5 })).positions).toHaveLength(5);
  });

  it('refuses an option that is no date', async () => {
    await expect(readSentences(folder, [gga('101500.00')], { date: '01.03.2025' })).rejects.toThrow(
      'date: expected YYYY-MM-DD, received 01.03.2025',
    );
  });

  it('are the true ones wherever in the file a date is first stated', async () => {
    const hours = fc.array(fc.integer({ min: 1, max: 11 }), { minLength: 1, maxLength: 30 });
    await fc.assert(
      fc.asyncProperty(hours, fc.nat(), fc.integer({ min: 0, max: 3000 }), async (steps, at, day) => {
        // Steps of less than twelve hours: every midnight is seen as a fall of more than twelve.
        let ms = Date.UTC(2020, 0, 1) + day * DAY_MS;
        const truth = steps.map((step) => {
          ms += step * 3_600_000;
          return new Date(ms).toISOString();
        });
        const lines = truth.flatMap((iso, k) => {
          const time = iso.slice(11, 19).replaceAll(':', '');
          const date = `${iso.slice(8, 10)}${iso.slice(5, 7)}${iso.slice(2, 4)}`;
          return k === at % truth.length ? [gga(time), rmc(time, date)] : [gga(time)];
        });
        const { positions } = await readSentences(folder, lines);
        expect(times(positions)).toEqual(truth);
      }),
      { seed: 43, numRuns: 200 },
    );
  });
});
