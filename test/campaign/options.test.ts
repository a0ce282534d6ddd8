import { describe, expect, it } from 'vitest';
import {
  CAMPAIGN_DEFAULTS,
  type CampaignOptions,
  resolveOptions,
  simulateErrors,
  simulateLog,
} from '../../src/campaign/index.js';

const message = (options: unknown): string => {
  try {
    resolveOptions(options as CampaignOptions);
  } catch (error) {
    expect(error).toBeInstanceOf(RangeError);
    return (error as Error).message;
  }
  throw new Error('nothing was thrown');
};

describe('campaign options', () => {
  it('are the defaults when none are given', () => {
    expect(resolveOptions({})).toEqual(CAMPAIGN_DEFAULTS);
  });

  it('fill nested objects key by key, and switch on with {}', () => {
    const settings = resolveOptions({
      constantMm: { up: 20 },
      wrongFixes: {},
      badDays: { runs: 2 },
      habitual: {},
    });
    expect(settings.constantMm).toEqual({ east: 5.5, north: 5.5, up: 20 });
    expect(settings.wrongFixes).toEqual({
      shareAt1Km: 0.003,
      shareAt12Km: 0.03,
      shortestMm: 50,
      longestMm: 1000,
      meanBurst: 1,
    });
    expect(settings.badDays).toEqual({ runs: 2, runLength: 3, singles: 0, factor: { from: 2, to: 5 } });
    expect(settings.habitual?.nearShare).toBe(0.8);
  });

  it('leave what is handed in as it was', () => {
    const given = Object.freeze({ constantMm: Object.freeze({ up: 20 }), crews: Object.freeze(['x']) });
    resolveOptions(given);
    expect(given).toEqual({ constantMm: { up: 20 }, crews: ['x'] });
  });

  it.each([
    [{ days: 0 }, 'campaign option "days": expected a whole number from 1 to 10000, received 0'],
    [{ days: 2.5 }, 'campaign option "days": expected a whole number from 1 to 10000, received 2.5'],
    [
      { seed: Number.NaN },
      'campaign option "seed": expected a whole number from 0 to 4294967295, received NaN',
    ],
    [
      { startDate: '2025-02-30' },
      'campaign option "startDate": expected a date written YYYY-MM-DD, received "2025-02-30"',
    ],
    [
      { constantMm: { up: -1 } },
      'campaign option "constantMm.up": expected a number of at least 0, received -1',
    ],
    [
      { constantMm: { height: 1 } },
      'campaign option "constantMm.height": there is no such option; there are east, north, up',
    ],
    [
      { workHours: { from: 17, to: 8 } },
      'campaign option "workHours": expected "from" not above "to", received {"from":17,"to":8}',
    ],
    [
      { base: { mounting: 'mast' } },
      'campaign option "base.mounting": expected "pillar" or "tripod", received "mast"',
    ],
    [{ rovers: ['R1'] }, 'campaign option "rovers": expected at least as many as crews (3), received 1'],
    [{ crews: ['A', 'A'] }, 'campaign option "crews": expected names that differ, received "A"'],
    [{ crews: [] }, 'campaign option "crews": expected a list of at least one, received []'],
    [
      { crews: ['A,B'] },
      'campaign option "crews[0]": expected a text without commas, semicolons, quotes, line breaks or blanks around it, received "A,B"',
    ],
    [
      { noFix: { shareAt1Km: 0 } },
      'campaign option "noFix": expected both shares 0 or both above 0, received {"shareAt1Km":0,"shareAt12Km":0.03}',
    ],
    [
      { days: 10, badDays: { runs: 3, runLength: 3 } },
      'campaign option "badDays": expected runs that fit into 10 days with an ordinary day between two (they need 11), received {"runs":3,"runLength":3,"singles":0}',
    ],
    [
      { marks: [{ name: 'P1', baselineKm: 0, azimuthDeg: 0, heightM: 0 }] },
      'campaign option "marks[0].baselineKm": expected a number from 0.01 to 200, received 0',
    ],
    [
      { habitual: 5 },
      'campaign option "habitual": expected an object with nearShare, nearKm, occupationsPerDay, received 5',
    ],
    [{ dependent: 'yes' }, 'campaign option "dependent": expected true or false, received "yes"'],
  ])('refuse %j', (options, text) => {
    expect(message(options)).toBe(text);
  });

  it('refuse unknown keys and name those there are', () => {
    expect(message({ day: 3 })).toMatch(
      /^campaign option "day": there is no such option; there are seed, days, startDate, .*habitual$/,
    );
  });

  it('refuse a mark farther above the base than away from it', () => {
    const marks = [{ name: 'P1', baselineKm: 0.2, azimuthDeg: 0, heightM: 900 }];
    expect(() => simulateErrors({ marks })).toThrow(
      'campaign option "marks P1": expected a height less than 0.2 km from the base\'s, received 900',
    );
  });

  it('refuse habitual shots without near or without far marks', () => {
    expect(() => simulateErrors({ habitual: { nearKm: 0.1 } })).toThrow(
      'campaign option "habitual.nearKm": expected a distance with marks on either side, received 0.1',
    );
  });

  it('refuse a log whose visits would run into each other, and say how many fit', () => {
    const crowded = { occupationsPerDay: { from: 100, to: 600 }, days: 1 };
    expect(() => simulateLog(crowded)).toThrow(
      'campaign option "occupationsPerDay": expected at most 450 a day for these crews, hours and epochs, so that visits stay apart, received 600',
    );
    expect(() => simulateLog({ ...crowded, occupationsPerDay: { from: 450, to: 450 } })).not.toThrow();
    expect(() => simulateErrors(crowded)).not.toThrow();
  });
});
