import { expect, it } from 'vitest';
import { equationOfTimeMinutes } from '../../src/time/index.js';

// Minutes by an astronomy library (apparent sun), and 16.123 by an almanac program for 2016-10-26 21 h. The
// low-precision series is known to stay within 2.3 s of them.
it.each([
  ['1992-10-13T00:00Z', 13.7065],
  ['2005-01-10T00:00Z', -7.4159],
  ['2016-10-26T21:00Z', 16.123],
  ['2024-02-11T12:00Z', -14.1932],
  ['2024-03-20T12:00Z', -7.3089],
  ['2024-05-13T12:00Z', 3.6507],
  ['2024-07-26T12:00Z', -6.5461],
  ['2024-11-03T12:00Z', 16.4504],
  ['2024-12-21T12:00Z', 1.7091],
  ['2025-06-21T00:00Z', -1.748],
])('the equation of time at %s is %d min', (time, minutes) => {
  expect(Math.abs(equationOfTimeMinutes(Date.parse(time)) - minutes)).toBeLessThan(0.04);
});
