import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { chartInUnits, markMapChart } from '../../src/charts/index.js';
import { lengthLikeNames, type Results, readerUnits, textInUnits } from '../../src/study/index.js';

const feet = readerUnits('international-foot');
const turn = (text: string, names: readonly string[] = []): string => textInUnits(text, feet, names);

describe('lengths in sentences', () => {
  it('are turned, 1609.344 m to the mile and 304.8 mm to the foot by definition', () => {
    expect(turn('stops at 1.609344 km')).toBe('stops at 1.0 mi');
    expect(turn('off by 304.8 mm')).toBe('off by 1.000 ft');
    expect(turn('304.8 m higher')).toBe('1000.0 ft higher');
  });

  it('are none in quotes: a mark "12 km" was once renamed', () => {
    expect(turn('mark "12 km" lies 1.609344 km off')).toBe('mark "12 km" lies 1.0 mi off');
    expect(turn('"a \\"5 m\\" b" and 304.8 mm')).toBe('"a \\"5 m\\" b" and 1.000 ft');
    // A single quotation mark encloses nothing.
    expect(turn('3" and 304.8 mm')).toBe('3" and 1.000 ft');
  });

  it('are none in names that look like them, quoted or not', () => {
    const names = ['12 km', '2 km', 'Post 4 m'];
    expect(turn('12 km (−304.8 mm), Post 4 m and 112 km', names)).toBe(
      '12 km (−1.000 ft), Post 4 m and 69.5 mi',
    );
    expect(turn('15 km', names)).toBe('9.3 mi');
  });

  it('leave any name in quotes alone', () => {
    fc.assert(
      fc.property(fc.string(), fc.nat(500), (name, number) => {
        const quoted = JSON.stringify(`${name} ${number} km`);
        expect(turn(`No mark is named ${quoted}.`)).toBe(`No mark is named ${quoted}.`);
      }),
      { seed: 6 },
    );
  });

  it('stay in metric', () => {
    expect(textInUnits('5 km', readerUnits('metric'))).toBe('5 km');
  });
});

describe('charts in feet', () => {
  const mark = {
    base: 'B1',
    azimuthDeg: 40,
    occupations: 30,
    days: 20,
    east: 3,
    north: -2,
    up: 1,
    se: { east: 1, north: 1, up: 1 },
  };
  const marks = [
    { ...mark, mark: '12 km', baselineKm: 12 },
    { ...mark, mark: 'P2', baselineKm: 4 },
  ];
  const part = { marks, controlMarks: [], siteMarks: [], bases: ['B1'], crews: [], rovers: [], setups: [] };
  const study = { title: 'Line of 20 km', surveyor: null };
  const results = { ...part, study, jobs: [], files: [], inputs: [] } as unknown as Results;

  it('keep the names of marks', () => {
    const names = lengthLikeNames(results);
    expect(names.sort()).toEqual(['12 km', 'Line of 20 km']);
    const chart = markMapChart({ marks, baseName: 'B1' });
    const drawn = JSON.stringify(chartInUnits(chart, feet, names).vegaLite);
    expect(drawn).toContain('12 km');
    expect(JSON.stringify(chartInUnits(chart, feet).vegaLite)).not.toContain('12 km');
  });
});
