import { describe, expect, it } from 'vitest';
import { simulateErrors } from '../../src/campaign/index.js';
import { hourDayRatios } from '../../src/days/index.js';
import { fitErrorModel, screenWrongFixes } from '../../src/fit/index.js';

const { rows } = simulateErrors({ days: 12, seed: 3 });
const model = fitErrorModel(rows, { component: 'horizontal' });

describe('hourDayRatios', () => {
  it('is the mean of squared error over the model’s square, worked out by hand for a cell', () => {
    const cells = hourDayRatios(rows, model);
    const cell = cells.find(({ occupations }) => occupations >= 3)!;
    const own = rows.filter(
      ({ day, solarHour }) => day === cell.day && solarHour >= cell.fromHour && solarHour < cell.toHour,
    );
    expect(own).toHaveLength(cell.occupations);
    const { displayA, displayB } = model.variance!;
    const squares = own.map(
      ({ east, north, baselineKm }) => (east ** 2 + north ** 2) / (displayA + displayB * baselineKm ** 2),
    );
    expect(cell.ratio ** 2).toBeCloseTo(squares.reduce((a, b) => a + b) / squares.length, 9);
  });

  it('holds every shot with a time once, is 1 on the whole, and does not mind the order of rows', () => {
    const cells = hourDayRatios(rows, model, { hours: 3 });
    expect(cells.reduce((total, { occupations }) => total + occupations, 0)).toBe(rows.length);
    // maximum likelihood makes the mean of y/μ exactly 1 (score of the scale of a gamma model with identity link)
    const whole = cells.reduce((total, { occupations, ratio }) => total + occupations * ratio ** 2, 0);
    expect(whole / rows.length).toBeCloseTo(1, 6);
    const turned = hourDayRatios([...rows].reverse(), model, { hours: 3 });
    expect(turned.map(({ day, fromHour, occupations }) => [day, fromHour, occupations])).toEqual(
      cells.map(({ day, fromHour, occupations }) => [day, fromHour, occupations]),
    );
  });

  it('leaves out shots without a time and of weight 0', () => {
    const gaps = rows.map((row, i) => (i < 10 ? { ...row, solarHour: Number.NaN } : row));
    const total = (cells: readonly { readonly occupations: number }[]): number =>
      cells.reduce((sum, { occupations }) => sum + occupations, 0);
    expect(total(hourDayRatios(gaps, model))).toBe(rows.length - 10);
    const { weights } = screenWrongFixes(rows);
    const cut = weights.map((weight, i) => (i < 7 ? 0 : weight));
    const kept = cut.filter((weight) => weight > 0).length;
    expect(total(hourDayRatios(rows, model, { weights: cut }))).toBe(kept);
  });

  it('refuses hours that do not divide the day, and errors without hours', () => {
    expect(() => hourDayRatios(rows, model, { hours: 5 })).toThrow(
      'hours: expected a whole number that divides 24, received 5',
    );
    expect(() =>
      hourDayRatios(
        rows.map(({ solarHour: _, ...rest }) => rest),
        model,
      ),
    ).toThrow('"solarHour"');
  });
});
