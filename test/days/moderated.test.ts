import { describe, expect, it } from 'vitest';
import { simulateErrors } from '../../src/campaign/index.js';
import { falseDiscoveryAdjusted, familyAdjusted } from '../../src/days/falseDiscovery.js';
import { moderatedDays, moderatedDaysOf, moderateVariances } from '../../src/days/moderatedVariance.js';
import { estimateVariance, fitErrorModel, prepareErrors } from '../../src/fit/index.js';
import { digamma, inverseTrigamma, median, tetragamma, trigamma } from '../../src/stats/index.js';
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

const dayDf = (df: unknown, d: number): unknown => (Array.isArray(df) ? df[d] : df);

/** R writes one number, a list or "Inf"; its script caps at 1e6. */
const largest = (df: unknown): number =>
  Math.min(1e6, Math.max(...[df].flat().map((each) => (each === 'Inf' ? 1e6 : Number(each)))));

describe.each(sets)('moderated variances of %s %s', (name, letter) => {
  const { days } = referenceFits(name)[letter];
  const data = axisData(name, AXES[letter as keyof typeof AXES]);
  const { A, B } = estimateVariance(data);

  it.each([
    ['plain', days.squeezeVar],
    ['robust', days.squeezeVar_robust],
  ] as const)('equal limma, %s', (kind, expected) => {
    const { prior, moderated, pValues } = moderateVariances(
      Float64Array.from(days.f),
      Float64Array.from(days.nu),
      kind,
    );
    close(prior.variance, expected.var_prior, 1e-6);
    close(Math.min(1e6, prior.degreesOfFreedom), largest(expected.df_prior), 1e-5);
    // Where days are alike limma still lets one that is too large go its own way; here all share one variance.
    const shared = (d: number) => prior.degreesOfFreedom < 1e6 || dayDf(expected.df_prior, d) === 'Inf';
    moderated.forEach((value, d) => {
      if (shared(d)) close(value, expected.var_post[d], 1e-6);
    });
    expect(expected.var_post.filter((_: number, d: number) => !shared(d)).length).toBeLessThanOrEqual(1);
    allClose(pValues, expected.p_upper, 1e-3);
    allClose(falseDiscoveryAdjusted([...pValues]), expected.BH, 1e-3);
  });

  it('rest on the degrees of freedom of R', () => {
    const each = moderatedDaysOf(data, A, B, days.kappa_used);
    expect(each.map(({ day }) => day)).toEqual(days.day);
    allClose(
      each.map(({ degreesOfFreedom }) => degreesOfFreedom),
      days.nu,
    );
  });

  it('turn into ppm as in R', () => {
    const each = moderatedDaysOf(data, A, B, days.kappa_used);
    const robust = days.squeezeVar_robust;
    each.forEach(({ ppm, moderatedRatio }, d) => {
      // The exception of above.
      if (Math.abs(moderatedRatio - robust.var_post[d]) > 0.1) expect(name).toBe('ref3_linear_base10');
      else close(ppm, days.ppm_shrunk[d], 1e-6);
    });
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
    days.squeezeVar_robust.BH,
    1e-5,
  );
  expect(each.filter(({ adjustedP }) => adjustedP <= 0.1).map(({ day }) => day)).toEqual(
    days.day.filter((_: string, d: number) => days.squeezeVar_robust.BH[d] <= 0.1),
  );
});

it('calls a day degraded that is found and 1.5 times worse than the median day, not one that merely differs', () => {
  const { rows } = simulateErrors({ seed: 41, days: 30, badDays: { runs: 2, runLength: 1 } });
  const each = moderatedDays(rows, fitErrorModel(rows, { component: 'horizontal' }));
  const usual = median(each.map(({ ppm }) => ppm));
  const named = each.filter(({ degraded }) => degraded);
  expect(named.length).toBeGreaterThan(0);
  for (const { degraded, adjustedP, ppm } of each)
    expect(degraded).toBe(adjustedP <= 0.1 && ppm >= 1.5 * usual);
  // Days alike but for a factor of 1.3 on two of them, with hundreds of shots: clearly different, not degraded.
  const alike = Array.from({ length: 12_000 }, (_, k) => {
    const baselineKm = 1 + (k % 30);
    const size = Math.hypot(5, (k % 24 < 22 ? 1 : 1.3) * baselineKm) * Math.SQRT2;
    return {
      day: `day ${String(k % 24).padStart(2, '0')}`,
      startMs: k,
      baselineKm,
      up: size * Math.sin(2.399963 * k),
    };
  });
  const differing = moderatedDays(alike, fitErrorModel(alike, { component: 'vertical' }));
  expect(differing.some(({ adjustedP }) => adjustedP <= 0.1)).toBe(true);
  expect(differing.some(({ degraded }) => degraded)).toBe(false);
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
