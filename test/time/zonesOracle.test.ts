import fc from 'fast-check';
import { Temporal } from 'temporal-polyfill';
import { describe, expect, it } from 'vitest';
import { type LocalToUtc, localToUtc } from '../../src/time/index.js';

/** Half-hour and quarter-hour offsets, shifts of half an hour and of two, rules that moved, a day that was skipped. */
const ZONES = [
  'Europe/Oslo',
  'Africa/Casablanca',
  'America/Caracas',
  'America/St_Johns',
  'Antarctica/Troll',
  'Asia/Kathmandu',
  'Asia/Pyongyang',
  'Australia/Lord_Howe',
  'Pacific/Apia',
  'Pacific/Chatham',
];
const FIRST_MS = Date.UTC(1990, 0, 1);
const LAST_MS = Date.UTC(2030, 11, 31);

/** The answer of the language's own calendar functions. */
function oracle(zone: string, wallMs: number): LocalToUtc {
  const wall = Temporal.Instant.fromEpochMilliseconds(wallMs).toZonedDateTimeISO('UTC').toPlainDateTime();
  const earlier = wall.toZonedDateTime(zone, { disambiguation: 'earlier' });
  const later = wall.toZonedDateTime(zone, { disambiguation: 'later' });
  if (earlier.epochMilliseconds === later.epochMilliseconds)
    return { kind: 'one', utcMs: earlier.epochMilliseconds };
  if (!earlier.toPlainDateTime().equals(wall)) return { kind: 'gap' };
  return {
    kind: 'overlap',
    earlierUtcMs: earlier.epochMilliseconds,
    laterUtcMs: later.epochMilliseconds,
  };
}

/** All changes of a zone's clocks in the years looked at, UTC milliseconds. */
function changesOf(zone: string): number[] {
  const changes: number[] = [];
  let at = Temporal.Instant.fromEpochMilliseconds(FIRST_MS).toZonedDateTimeISO(zone);
  for (;;) {
    const next = at.getTimeZoneTransition('next');
    if (!next || next.epochMilliseconds > LAST_MS) return changes;
    changes.push(next.epochMilliseconds);
    at = next;
  }
}

describe('localToUtc against Temporal', () => {
  it('any clock reading of 1990 to 2030', () => {
    fc.assert(
      fc.property(fc.constantFrom(...ZONES), fc.integer({ min: FIRST_MS, max: LAST_MS }), (zone, wallMs) => {
        expect(localToUtc(zone, wallMs)).toEqual(oracle(zone, wallMs));
      }),
      { seed: 33, numRuns: 4000 },
    );
  });
  it('gaps and overlaps: readings about every change of clocks', () => {
    const kinds = { one: 0, gap: 0, overlap: 0 };
    for (const zone of ZONES)
      for (const change of changesOf(zone))
        for (const minutes of [-1441, -121, -91, -61, -31, -1, 0, 1, 29, 31, 59, 61, 121, 1441]) {
          const offset =
            Temporal.Instant.fromEpochMilliseconds(change).toZonedDateTimeISO(zone).offsetNanoseconds / 1e6;
          const wallMs = change + offset + minutes * 60_000;
          const found = localToUtc(zone, wallMs);
          expect(found, `${zone} ${new Date(wallMs).toISOString()}`).toEqual(oracle(zone, wallMs));
          kinds[found.kind] += 1;
        }
    // all three happen often, so that the comparison means something
    expect(Math.min(kinds.one, kinds.gap, kinds.overlap)).toBeGreaterThan(300);
  });
});
