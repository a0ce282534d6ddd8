import { describe, expect, it } from 'vitest';
import { markFrame, matchBase, matchMark } from '../../src/control/index.js';
import { geodeticToGeocentric } from '../../src/geodesy/index.js';
import { BASES, base as baseAt, control, MARKS, mark } from '../errors/world.js';

describe('matchMark', () => {
  const known = control({ CP5: MARKS.CP1!, '007': MARKS.CP2! });

  it('knows a mark by exactly its name', () => {
    expect(matchMark(known, 'CP5')).toMatchObject({ kind: 'known', point: { name: 'CP5' } });
    expect(matchMark(known, '007')).toMatchObject({ kind: 'known', point: { name: '007' } });
  });

  it.each([
    ['CP-5', 'no mark is named "CP-5" (did you mean "CP5"?)'],
    ['cp5', 'no mark is named "cp5" (did you mean "CP5"?)'],
    ['7', 'no mark is named "7" (did you mean "007"?)'],
    ['TREE', 'no mark is named "TREE"'],
    ['', 'the row names no mark'],
  ])('%j: %s', (name, detail) => {
    expect(matchMark(known, name)).toEqual({ kind: 'unknown', detail });
  });
});

describe('matchBase', () => {
  it('takes the only base where a row names none', () => {
    expect(matchBase(control(), '')).toMatchObject({ kind: 'known', point: { name: 'B1' } });
    expect(matchBase(control(), 'B1')).toMatchObject({ kind: 'known' });
  });

  it('cannot know which of several is meant', () => {
    const two = control(MARKS, BASES);
    expect(matchBase(two, '')).toEqual({
      kind: 'unknown',
      detail: 'the row names no base and the study has 2',
    });
    expect(matchBase(two, 'B-2')).toEqual({
      kind: 'unknown',
      detail: 'no base is named "B-2" (did you mean "B2"?)',
    });
  });
});

describe('markFrame', () => {
  const base = baseAt('B1', BASES.B1!);
  const origin = (position: typeof MARKS.CP1) =>
    markFrame(mark('M', position!), base).toLocal(geodeticToGeocentric(MARKS.CP1!));

  it('lies at the mark, with what is not known of it taken from the base', () => {
    const unknown = Number.NaN;
    const { latitudeDeg, longitudeDeg, heightM } = MARKS.CP1!;
    const whole = origin(MARKS.CP1);
    expect(Math.hypot(whole.eastM, whole.northM, whole.upM)).toBeLessThan(1e-8);
    // The base is 10 m higher than the mark.
    expect(origin({ latitudeDeg, longitudeDeg, heightM: unknown }).upM).toBeCloseTo(-10, 6);
    // 0.01 degrees of latitude are about 1112 m.
    expect(origin({ latitudeDeg: unknown, longitudeDeg: unknown, heightM }).northM).toBeCloseTo(1112, 0);
  });
});
