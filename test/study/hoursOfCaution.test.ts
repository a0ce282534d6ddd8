import { describe, expect, it } from 'vitest';
import type { Control } from '../../src/control/index.js';
import type { OccupationError } from '../../src/errors/index.js';
import { hoursOfCaution, shotHours } from '../../src/study/hoursOfCaution.js';
import type { TimeOfDayResult } from '../../src/study/index.js';

const ppm = (estimate: number) => ({ estimate, low: null, high: null });
const hours = (pValue: number | null): TimeOfDayResult => ({
  component: 'horizontal',
  pValue,
  hours: [
    { from: 8, to: 12, ppm: ppm(0.9), occupations: 9, days: 20 },
    { from: 12, to: 16, ppm: ppm(1.4), occupations: 9, days: 20 },
  ],
  harmonics: null,
});
const control = {
  bases: new Map([
    ['A', { position: { longitudeDeg: 9 } }],
    ['B', { position: { longitudeDeg: -160 } }],
  ]),
} as unknown as Control;
const errors = [
  { base: 'A', day: '2025-03-01' },
  { base: 'A', day: '2025-07-02' },
  { base: 'B', day: '2025-07-01' },
] as OccupationError[];

describe('hours of the shots', () => {
  const shots = [7.25, Number.NaN, 15.5].map((solarHour, k) => ({ ...errors[k]!, solarHour }));
  it('are the first and the last, by the sun and by the clock', () => {
    // As above: the clock is 2 h - 36 min ahead of the sun.
    expect(shotHours(shots, control, { timeZone: 'Europe/Zurich' })).toEqual({
      fromHour: 7.25,
      toHour: 15.5,
      clock: { day: '2025-07-02', fromHour: expect.closeTo(8.65, 9), toHour: expect.closeTo(16.9, 9) },
    });
    expect(shotHours(shots, control, { timeZone: null })!.clock).toBeNull();
  });
  it('are not known without a time of day', () => {
    expect(shotHours(shots.slice(1, 2), control, { timeZone: 'UTC' })).toBeNull();
  });
});

describe('hours of caution', () => {
  it('are the worst ones, by the sun and by the clock of the last day at the base of most shots', () => {
    // Central European Summer Time is UTC + 2 h; the sun at 9 degrees east is 36 minutes ahead of UTC (15 degrees an hour).
    expect(hoursOfCaution([hours(0.01)], errors, control, { timeZone: 'Europe/Zurich' })).toEqual([
      {
        component: 'horizontal',
        fromHour: 12,
        toHour: 16,
        clock: { day: '2025-07-02', fromHour: expect.closeTo(13.4, 9), toHour: expect.closeTo(17.4, 9) },
      },
    ]);
    const fixed = hoursOfCaution([hours(0.01)], errors, control, { timeZone: '+02:00' });
    expect(fixed).toEqual(hoursOfCaution([hours(0.01)], errors, control, { timeZone: 'Europe/Zurich' }));
  });
  it('have no clock without a zone', () => {
    expect(hoursOfCaution([hours(0.01)], errors, control, { timeZone: null })[0]!.clock).toBeNull();
  });
  it('are none where hours do not differ or cannot be judged', () => {
    for (const pValue of [0.05, 0.4, null])
      expect(hoursOfCaution([hours(pValue)], errors, control, { timeZone: 'UTC' })).toEqual([]);
  });
});
