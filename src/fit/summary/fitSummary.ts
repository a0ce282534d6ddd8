import type { Message } from '../../logs/index.js';
import { degreesOfFreedom } from '../clusterCovariance.js';
import type { Comparison } from '../compareForms.js';
import type { ErrorModel, Reference } from '../errorModel.js';
import type { FitComponent, Form } from '../forms.js';
import type { Jackknife } from '../jackknife.js';
import { type Coefficient, coefficientTable } from './coefficientTable.js';

/** What can be told beside a fit: each the result of its own function on the same errors. */
export interface FitExtras {
  readonly comparison?: Comparison | undefined;
  readonly jackknife?: Jackknife | undefined;
}

/** A fit as a reader meets it, before it is laid out as text or page. */
export interface FitSummary {
  readonly title: string;
  /** What the fit is: words and what they say. */
  readonly facts: readonly (readonly [word: string, text: string])[];
  /** Level of the limits. */
  readonly confidence: number;
  readonly coefficients: readonly Coefficient[];
  /** What the numbers mean. */
  readonly remarks: readonly string[];
  readonly notes: readonly Message[];
}

const COMPONENT_TITLES: Readonly<Record<FitComponent, string>> = {
  horizontal: 'Horizontal error model',
  vertical: 'Vertical error model',
  east: 'Error model of east',
  north: 'Error model of north',
};

const COUNTED_FROM: Readonly<Record<Reference, string>> = {
  absolute: 'the published coordinates (absolute)',
  repeatability:
    "each mark's mean of its other days (repeatability): how well a position is found again on another day",
  relative: 'the offset common to each base setup (relative)',
};

const FORMULAS: Readonly<Record<Form, string>> = {
  'root-sum-square': 'spread² = constant² + (ppm × km)² (root-sum-square)',
  'linear-sum': 'spread = constant + ppm × km (linear-sum)',
};

/** Puts a fit into words. */
export function fitSummary(model: ErrorModel<FitComponent>, extras: FitExtras = {}): FitSummary {
  const { component, basis, reference, form, markComponent, notes, confidence } = model;
  const composed =
    markComponent === null
      ? ''
      : '; constant from repeatability and the errors of marks, ppm from repeatability';
  return {
    title: `${COMPONENT_TITLES[component]}, ${basis}`,
    facts: [
      ['counted from', `${COUNTED_FROM[reference]}${composed}`],
      ['form', FORMULAS[form]],
      ['data', dataText(model)],
      [
        'wrong fixes',
        model.screened
          ? 'suspected ones count less or not at all'
          : 'not looked for: every occupation counts in full',
      ],
      ['interval', `${model.interval}${worthText(model)}`],
    ],
    confidence,
    coefficients: coefficientTable(model),
    remarks: [...meaning(model), ...dependence(model), ...extraRemarks(extras)],
    notes,
  };
}

function dataText(model: ErrorModel<FitComponent>): string {
  const { occupations, days, marks, shortestKm, longestKm, repeatability } = model;
  const on = [counted(days, 'day'), ...(marks === null ? [] : [counted(marks, 'mark')])].join(' and ');
  const aside =
    repeatability !== null && repeatability.setAside > 0
      ? `; ${repeatability.setAside} more on marks with a single day take no part`
      : '';
  return `${counted(occupations, 'occupation')} on ${on}, ${shortestKm.toFixed(1)} to ${longestKm.toFixed(1)} km from the base${aside}`;
}

/** How many days the interval is worth: few days carry the long lines. */
function worthText({ uncertainty }: ErrorModel<FitComponent>): string {
  if (uncertainty === null) return '';
  const df = (contrast: readonly [number, number]): string =>
    degreesOfFreedom(uncertainty.terms, contrast).toFixed(1);
  return `; degrees of freedom ${df([1, 0])} for the constant, ${df([0, 1])} for the ppm`;
}

function meaning({
  confidence,
  interval,
  ppm,
  ppmIfIndependent,
  informationNumber,
  uncertainty,
}: ErrorModel<FitComponent>): string[] {
  if (interval === 'none') return ['There are no intervals; the notes say why.'];
  const level = percent(confidence);
  const { low, high } = ppmIfIndependent;
  return [
    `Of many campaigns like this one, about ${level} would give intervals that hold the true value. They count days, not shots, and speak of days like those observed.`,
    ...(ppm.estimate === null || low === null || high === null
      ? []
      : [
          `If every shot were independent, the ppm would seem to lie between ${low.toFixed(2)} and ${high.toFixed(2)}: shots of one day are alike, so that is too narrow.`,
        ]),
    ...(uncertainty === null
      ? []
      : [
          `Information on distance: ${informationNumber.toFixed(0)} (from 15 on the interval counts days by CR3, 30 is comfortable).`,
        ]),
  ];
}

function dependence({ repeatability, setups, markComponent }: ErrorModel<FitComponent>): string[] {
  return [
    ...(repeatability === null
      ? []
      : [
          `Occupations of one mark on one day correlate by ${repeatability.rho.toFixed(2)}.${
            repeatability.sharedMeans === null
              ? ''
              : ` Days share the means of marks: variances are ${repeatability.sharedMeans.constant.toFixed(2)} (constant) and ${repeatability.sharedMeans.ppm.toFixed(2)} (ppm) times as large for it.`
          }`,
        ]),
    ...(setups === null
      ? []
      : [
          `${counted(setups.setups.length, 'setup')} separated${setups.marksTakenOut ? ", after the marks' own means" : ''}; occupations of one visit correlate by ${setups.rho.toFixed(2)}.`,
        ]),
    ...(markComponent === null
      ? []
      : [`The errors of marks rest on ${counted(markComponent.marksUsed, 'mark')} with three days or more.`]),
  ];
}

function extraRemarks({ comparison, jackknife }: FitExtras): string[] {
  return [
    ...(comparison === undefined ? [] : [comparisonText(comparison)]),
    ...(jackknife === undefined ? [] : jackknifeTexts(jackknife)),
  ];
}

function comparisonText({ gain, se, days, verdict }: Comparison): string {
  if (gain === null || se === null) return 'The two forms were not compared: too few days.';
  const figures = `root-sum-square gains ${gain.toFixed(4)} ± ${se.toFixed(4)} in log score per shot on ${days} days left out in turn`;
  return verdict === 'cannot be told apart'
    ? `The two forms cannot be told apart with these days (${figures}).`
    : `Days left out are predicted better by ${verdict} (${figures}).`;
}

function jackknifeTexts({ ppm, influence }: Jackknife): string[] {
  const [most] = influence;
  return [
    ...(ppm.low === null || ppm.high === null
      ? []
      : [`Jackknife over days, as a check: ppm ${ppm.low.toFixed(2)} to ${ppm.high.toFixed(2)}.`]),
    ...(most === undefined
      ? []
      : [
          `The day that moves the ppm most is ${most.day}: without it the ppm is ${most.ppmWithout.toFixed(2)}.`,
        ]),
  ];
}

const counted = (value: number, what: string): string => `${value} ${what}${value === 1 ? '' : 's'}`;

export const percent = (share: number): string => `${Number((100 * share).toFixed(1))} %`;
