import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { areaOutside, overlapArea, placeLabels, spreadLabels } from '../../src/charts/placement.js';

const box = (left: number, top: number, width = 10, height = 10) => ({
  left,
  top,
  right: left + width,
  bottom: top + height,
});

describe('spreadLabels', () => {
  it('leaves labels alone that have room', () => {
    expect(spreadLabels([50, 10], [20, 20])).toEqual([50, 10]);
  });

  it('moves two that collide apart by the same amount', () => {
    expect(spreadLabels([50, 54], [20, 20])).toEqual([42, 62]);
  });

  it('keeps the order, lets nothing overlap and moves the middle of a block not at all', () => {
    const label = fc.record({
      centre: fc.integer({ min: 0, max: 400 }),
      height: fc.integer({ min: 5, max: 40 }),
    });
    fc.assert(
      fc.property(fc.array(label, { minLength: 1, maxLength: 8 }), (labels) => {
        const centres = labels.map(({ centre }) => centre);
        const heights = labels.map(({ height }) => height);
        const moved = spreadLabels(centres, heights);
        for (let i = 0; i < labels.length; i++) {
          for (let k = 0; k < labels.length; k++) {
            if (i === k) continue;
            expect(Math.abs(moved[i]! - moved[k]!)).toBeGreaterThanOrEqual(
              (heights[i]! + heights[k]!) / 2 - 1e-9,
            );
            if (centres[i]! < centres[k]!) expect(moved[i]!).toBeLessThan(moved[k]!);
          }
        }
        const sum = (list: readonly number[]): number => list.reduce((a, b) => a + b, 0);
        expect(sum(moved)).toBeCloseTo(sum(centres), 6);
      }),
      { seed: 9 },
    );
  });
});

describe('placeLabels', () => {
  const plot = box(0, 0, 100, 100);

  it('takes the free place, else the one that covers least, and remembers labels placed before', () => {
    const places = [box(0, 0), box(50, 50)].map((b, k) => ({ box: b, wish: k, place: k }));
    const chosen = placeLabels([places, places, places], [box(5, 0)], plot);
    // the first finds (0, 0) half covered, the second (50, 50) full, the third both covered
    expect(chosen.map(({ place }) => place)).toEqual([1, 0, 1]);
    expect(chosen.map(({ coveredPx2 }) => coveredPx2)).toEqual([0, 50, 100]);
  });

  it('leaves the plot only when all else is worse', () => {
    const places = [box(95, 0), box(0, 0)].map((b, k) => ({ box: b, wish: 0, place: k }));
    expect(placeLabels([places], [box(0, 0)], plot)[0]!.place).toBe(1);
    expect(areaOutside(box(95, 0), plot)).toBe(50);
    expect(overlapArea(box(0, 0), box(10, 0))).toBe(0);
  });
});
