import { describe, expect, it } from 'vitest';
import { comboRms } from '../../src/days/dayGrid.js';
import { dayRatios } from '../../src/days/dayRatios.js';
import {
  comboQuantiles,
  dayModelNodes,
  dayModelOf,
  dayQuantilePpm,
  effectiveShare,
  fittedSpread,
} from '../../src/days/index.js';
import { weightedQuantiles } from '../../src/days/weightedQuantile.js';
import { estimateVariance, type FitData, fitErrorModel, prepareErrors } from '../../src/fit/index.js';
import { referenceFits } from '../fit/reference.js';
import { allClose, axisData, close, readDaysFixture, referenceWeights, timedErrors } from './reference.js';

// Source of every expected number: an implementation in R and limma 3.54 (fixtures/fits, with recipe); where weights
// are needed, from fixtures/days. Tolerance 1e-8 relative: the same grid.

interface Case {
  readonly name: string;
  readonly data: FitData;
  // biome-ignore lint/suspicious/noExplicitAny: fields of a file that R wrote
  readonly expected: any;
  /** From the scale of the reference (per axis) to that of a radial error. */
  readonly scale: number;
}

const weighted = (name: string): Case[] => {
  const weights = referenceWeights(name);
  const { pipeline } = referenceFits(name);
  return [
    { name: `${name} up, weighted`, data: axisData(name, 'up', weights), expected: pipeline.U, scale: 1 },
    {
      name: `${name} radial, weighted`,
      data: prepareErrors(timedErrors(name), 'horizontal', weights),
      expected: pipeline.H_component,
      scale: Math.SQRT2,
    },
  ];
};
const plain = (name: string, letter: string, axis: 'east' | 'north' | 'up'): Case => ({
  name: `${name} ${axis}`,
  data: axisData(name, axis),
  expected: referenceFits(name)[letter],
  scale: 1,
});

const CASES: readonly Case[] = [
  plain('ref1_mild15', 'U', 'up'),
  plain('ref1_mild15', 'E', 'east'),
  plain('ref1_mild15', 'N', 'north'),
  plain('ref3_linear_base10', 'U', 'up'),
  ...weighted('ref1_mild15'),
  ...weighted('ref2_heavy25_gross'),
];

describe.each(CASES)('$name', ({ data, expected, scale }) => {
  const { A, B, displayA, displayB } = estimateVariance(data);
  it('is a fit that needs no display rule', () => {
    expect([displayA, displayB]).toEqual([A, B]);
  });

  it('has the day factors and the effective share of R', () => {
    const ratios = dayRatios(data, A, B);
    expect(ratios.days).toEqual(expected.days.day);
    allClose(ratios.factors, expected.days.f);
    allClose(ratios.omegaSums, expected.days.sum_omega);
    allClose(ratios.omegaSquares, expected.days.sum_omega2);
    const share = effectiveShare(data, A, B);
    close(share.fromCorrelation, expected.days.kappa_acf);
    close(share.share, expected.days.kappa_used);
  });

  // No gate here: R has none. Standard errors of 0 let every fit pass.
  const model = dayModelOf(data, { A, B, standardErrorA: 0, standardErrorB: 0, independentErrorB: 0 });

  it('has the grid posterior of R', () => {
    const { hier } = expected;
    const triple = ({ low, estimate, high }: (typeof model)['tau']) => [low!, estimate!, high!];
    allClose(
      triple(model.medianDayPpm),
      hier.median_day_ppm.map((x: number) => scale * x),
    );
    allClose(
      triple(model.longRunPpm),
      hier.rms_ppm.map((x: number) => scale * x),
    );
    allClose(triple(model.tau), hier.tau);
    allClose(
      dayQuantilePpm(model.posterior!, hier.q, [0.025, 0.5, 0.975, 0.95]),
      [...hier.ppm_q_day, hier.ppm_q_day_upper95].map((x: number) => scale * x),
    );
  });

  it('has the days of R', () => {
    const { days } = expected.hier;
    const each = model.dayEstimates;
    expect(each.map(({ day }) => day)).toEqual(days.day);
    allClose(
      each.map(({ ppm }) => ppm.estimate / scale),
      days.ppm_mean,
    );
    allClose(
      each.map(({ ppm }) => ppm.low / scale),
      days.ppm_lo,
    );
    allClose(
      each.map(({ ppm }) => ppm.high / scale),
      days.ppm_hi,
    );
    each.forEach(({ probabilityDegraded }, d) => {
      expect(Math.abs(probabilityDegraded - days.p_degraded[d])).toBeLessThan(1e-8);
    });
    expect(model.degradedDays).toEqual(days.flagged_bfdr10);
  });
});

it('has the posterior of R at every node of the constant', () => {
  const data = axisData('ref1_mild15', 'up');
  const spread = fittedSpread(fitErrorModel(timedErrors('ref1_mild15'), { component: 'vertical' }))!;
  const nodes = dayModelNodes(dayModelOf(data, spread).posterior!);
  const expected = readDaysFixture('nodes.json');
  allClose(
    nodes.map(({ A }) => A),
    expected.A!,
  );
  const medians = (values: Float64Array, level: number): number[] =>
    nodes.map(
      ({ comboWeights }) =>
        Math.sqrt(spread.B) * Math.exp(weightedQuantiles(values, comboWeights, [level])[0]!),
    );
  allClose(medians(comboQuantiles(0.5), 0.5), expected.median_day_ppm!);
  allClose(medians(comboRms(), 0.5), expected.rms_ppm!);
  allClose(medians(comboQuantiles(0.9), 0.95), expected.q_day_upper95!);
});
