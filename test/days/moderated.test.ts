import { describe, expect, it } from 'vitest';
import { falseDiscoveryAdjusted, familyAdjusted } from '../../src/days/falseDiscovery.js';
import { moderatedDaysOf, moderatedPpm, moderateVariances } from '../../src/days/moderatedVariance.js';
import { estimateVariance, prepareErrors } from '../../src/fit/index.js';
import { digamma, inverseTrigamma, tetragamma, trigamma } from '../../src/stats/index.js';
import { referenceFits } from '../fit/reference.js';
import { allClose, axisData, close, readDaysFixture, referenceWeights, timedErrors } from './reference.js';

// Expected: limma 3.54 squeezeVar and p.adjust of R 4.2 (fixtures/fits). With infinite prior degrees of freedom R's
// script caps them at 1e6, hence 1e-3 for its chances.
const sets: readonly [string, string][] = [
  ['ref1_mild15', 'U'],
  ['ref1_mild15', 'E'],
  ['ref1_mild15', 'N'],
  ['ref3_linear_base10', 'U'],
  ['ref3_linear_base10', 'E'],
  ['ref3_linear_base10', 'N'],
];
const AXES = { U: 'up', E: 'east', N: 'north' } as const;

describe.each(sets)('moderated variances of %s %s', (name, letter) => {
  const { days } = referenceFits(name)[letter];
  const data = axisData(name, AXES[letter as keyof typeof AXES]);
  const { A, B } = estimateVariance(data);

  it('equal limma', () => {
    const { prior, moderated, pValues } = moderateVariances(
      Float64Array.from(days.f),
      Float64Array.from(days.nu),
    );
    close(prior.variance, days.squeezeVar.var_prior, 1e-6);
    if (days.squeezeVar.df_prior === 'Inf') expect(prior.degreesOfFreedom).toBe(Number.POSITIVE_INFINITY);
    else close(prior.degreesOfFreedom, days.squeezeVar.df_prior, 1e-6);
    allClose(moderated, days.squeezeVar.var_post, 1e-6);
    allClose(pValues, days.squeezeVar.p_upper, 1e-3);
    allClose(falseDiscoveryAdjusted([...pValues]), days.squeezeVar.BH, 1e-3);
  });

  it('rest on the degrees of freedom of R', () => {
    const each = moderatedDaysOf(data, A, B, days.kappa_used);
    expect(each.map(({ day }) => day)).toEqual(days.day);
    allClose(
      each.map(({ degreesOfFreedom }) => degreesOfFreedom),
      days.nu,
    );
    allClose(
      each.map(({ moderatedRatio }) => moderatedRatio),
      days.squeezeVar.var_post,
      1e-6,
    );
  });

  it('turn into ppm as in R', () => {
    // The reference forms its ppm from the robust variances.
    const ppm = moderatedPpm(
      Float64Array.from(days.squeezeVar_robust.var_post as number[]),
      Float64Array.from(days.sum_omega),
      Float64Array.from(days.sum_omega2),
      B,
    );
    allClose(ppm, days.ppm_shrunk);
  });
});

it('names the degraded days of the set with gross errors at 10 % where R does', () => {
  const weights = referenceWeights('ref2_heavy25_gross');
  const data = prepareErrors(timedErrors('ref2_heavy25_gross'), 'horizontal', weights);
  const { days } = referenceFits('ref2_heavy25_gross').pipeline.H_component;
  const { A, B } = estimateVariance(data);
  const each = moderatedDaysOf(data, A, B, days.kappa_used);
  allClose(
    each.map(({ adjustedP }) => adjustedP),
    days.squeezeVar.BH,
    1e-6,
  );
  expect(each.filter(({ adjustedP }) => adjustedP <= 0.1).map(({ day }) => day)).toEqual(
    days.day.filter((_: string, d: number) => days.squeezeVar.BH[d] <= 0.1),
  );
});

describe('adjusted p-values', () => {
  it('are those of R p.adjust for p = .01, .04, .03, .5', () => {
    // R 4.2: p.adjust(c(.01, .04, .03, .5), "BH") and "holm"
    allClose(falseDiscoveryAdjusted([0.01, 0.04, 0.03, 0.5]), [0.04, 0.16 / 3, 0.16 / 3, 0.5], 1e-12);
    allClose(familyAdjusted([0.01, 0.04, 0.03, 0.5]), [0.04, 0.09, 0.09, 0.5], 1e-12);
  });
});

describe('polygamma functions', () => {
  // R 4.2 digamma, trigamma, psigamma (fixtures/days)
  const { x, digamma: psi, trigamma: first, tetragamma: second } = readDaysFixture('polygamma.json');
  it('equal R', () => {
    allClose(x!.map(digamma), psi!, 1e-13);
    allClose(x!.map(trigamma), first!, 1e-13);
    allClose(x!.map(tetragamma), second!, 1e-13);
  });
  it('are inverted', () => {
    allClose(first!.map(inverseTrigamma), x!, 1e-10);
  });
  it('refuse arguments that are not above 0', () => {
    for (const f of [digamma, trigamma, tetragamma, inverseTrigamma]) expect(() => f(0)).toThrow(RangeError);
  });
});
