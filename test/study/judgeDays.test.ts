import { expect, it } from 'vitest';
import { degradedMessage } from '../../src/study/judgeDays.js';

const day = (name: string, factor: number, subject: string | null = null) => ({
  day: name,
  factor,
  verdict: subject === null ? ('grows with distance' as const) : ('bad setup' as const),
  subject,
});

it('tells degraded days in a row as one event', () => {
  const days = [day('2025-03-10', 2.14), day('2025-04-04', 1.8, 'B1'), day('2025-04-07', 3)];
  const events = [
    { from: '2025-03-10', to: '2025-03-10', days: ['2025-03-10'] },
    { from: '2025-04-04', to: '2025-04-07', days: ['2025-04-04', '2025-04-07'] },
  ];
  const stay = 'They stay in the fit; a day is left out only where leaveOutDays names it.';
  expect(degradedMessage('vertical', events, days).map(({ text }) => text)).toEqual([
    `3 days were worse than the median day in vertical ppm, which makes 2 events: 2025-03-10 (2.1 times, grows with distance), 2025-04-04, 2025-04-07 in a row (1.8 times, bad setup "B1"; 3.0 times, grows with distance). ${stay}`,
  ]);
  expect(degradedMessage('horizontal', events.slice(0, 1), days.slice(0, 1)).map(({ text }) => text)).toEqual(
    [
      `One day was worse than the median day in horizontal ppm: 2025-03-10 (2.1 times, grows with distance). ${stay}`,
    ],
  );
  expect(degradedMessage('horizontal', [], [])).toEqual([]);
});
