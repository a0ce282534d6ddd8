import type { RuleOptions } from './ground.js';
import type { Judged } from './maximumBaseline.js';
import type { Tolerance } from './tolerance.js';

/** What must be said beside the numbers of a rule. */
export function remarksOf(
  { maximumBaselineKm, method, dayBound }: Judged,
  { component, share }: Tolerance,
  { baseSigmaMm, basePpm, formDoubt, wrongFixes, height, visits = [] }: RuleOptions,
  crowded: boolean,
): string[] {
  if (maximumBaselineKm === null) return [];
  const withoutFix = visits.filter(({ fixedRows }) => fixedRows === 0).length;
  return [
    ...(method === 'pooled'
      ? ['It holds over all days together; on how many single days it holds is not judged.']
      : []),
    ...(share > 0.95 && method === 'day-model'
      ? [
          'For a share above 95 % the rule also holds over the mixture of all days, because rare errors are larger than a day tells by its RMS.',
        ]
      : []),
    ...(wrongFixes
      ? []
      : ['Wrong fixes were not searched for: those among the errors count as ordinary errors.']),
    ...(crowded
      ? [
          'On some days several shots were suspected to be wrong fixes. The rule is the shorter of those with and without these suspicions.',
        ]
      : []),
    ...(formDoubt
      ? [
          'Days left out do not tell root-sum-square and linear sum apart: at each length the larger spread of both counts.',
        ]
      : []),
    ...baseRemarks(component, baseSigmaMm, basePpm),
    ...(height === undefined
      ? []
      : [`The rule is for sites ${Math.abs(height.differenceM).toFixed(0)} m above or below their base.`]),
    ...(dayBound === null ? [] : [dayBound.sentence]),
    ...(withoutFix > 0
      ? [`${withoutFix} of ${visits.length} visits got no fix: the rule speaks of the others alone.`]
      : []),
  ];
}

function baseRemarks(
  component: Tolerance['component'],
  baseSigmaMm: number | undefined,
  basePpm: number | undefined,
): string[] {
  if (baseSigmaMm === undefined && basePpm === undefined) {
    return [
      "The error of a base's coordinates, the same on all positions from it, is not in the rule because it was not stated.",
    ];
  }
  return [
    ...(baseSigmaMm === undefined
      ? []
      : [
          `The stated error of the base's coordinates, ${Number(baseSigmaMm.toFixed(1))} mm${component === 'horizontal' ? ' per axis' : ''}, is in the rule.`,
        ]),
    ...(basePpm === undefined
      ? []
      : [
          `A base stands on an assumed coordinate: the ${Number(basePpm.toPrecision(2))} ppm that its error adds to every baseline (metres / 20, common practice) are taken off the limit; the shift that all positions from it share is not in the rule.`,
        ]),
  ];
}
