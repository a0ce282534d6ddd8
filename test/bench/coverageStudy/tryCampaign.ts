import {
  type CampaignOptions,
  type SimulatedOccupation,
  simulateErrors,
} from '../../../src/campaign/index.js';
import { dayModel } from '../../../src/days/index.js';
import {
  type Component,
  chooseReference,
  composeAbsolute,
  type EstimateWithLimits,
  fitErrorModel,
  screenWrongFixes,
  sigmaAtMm,
  sigmaLimitsMm,
} from '../../../src/fit/index.js';
import { randomStream } from '../../../src/stats/index.js';
import { ppmInterval } from '../../../src/study/judgeDays.js';
import { BAD_FACTOR, BAD_SHARE, ORDINARY, type World } from './worlds.js';

/** An estimate with its interval beside the truth. */
export interface Tried extends EstimateWithLimits {
  readonly truth: number;
}

/** What one campaign gave for one component. */
export interface TriedComponent {
  readonly constant: Tried;
  /** Counted by days alone. */
  readonly ppm: Tried;
  /** As a study states it: from the day model where days are disturbed. */
  readonly stated: Tried;
  readonly fromDayModel: boolean;
  readonly sigma10: Tried;
  /** Against the published coordinates; null where it is not composed. */
  readonly absolute: Tried | null;
  readonly warned: boolean;
}

/** What one campaign gave. */
export interface TriedCampaign {
  readonly components: readonly TriedComponent[];
  readonly wrong: number;
  readonly found: number;
  readonly suspected: number;
  readonly occupations: number;
}

const COMPONENTS: readonly Component[] = ['horizontal', 'vertical'];
const AT_KM = 10;
/** What a study tells of a ppm that may not hold in days to come. */
const WARNINGS: ReadonlySet<string> = new Set([
  'too-few-days',
  'indicative',
  'ppm-indicative',
  'ppm-not-distinguishable',
  'ppm-upper-limit-only',
  'one-day-dominates',
]);

/** Simulates a campaign and goes through it as a study does: screening, reference, fit, days. */
export function tryCampaign(world: World, seed: number): TriedCampaign {
  const { rows, truth } = simulateErrors(campaignOptions(world, seed));
  const { weights, suspected } = screenWrongFixes(rows);
  const growth = Math.sqrt(longRunSquare(world));
  return {
    components: COMPONENTS.map((component) => {
      const { constantMm, absoluteConstantMm, medianDayPpm } = truth.components[component];
      return tryComponent(rows, weights, component, {
        constant: constantMm,
        absolute: absoluteConstantMm,
        ppm: medianDayPpm * growth,
      });
    }),
    wrong: rows.filter(({ wrongFix }) => wrongFix).length,
    found: suspected.filter((i) => rows[i]!.wrongFix).length,
    suspected: suspected.length,
    occupations: rows.length,
  };
}

/** The options of one campaign; in a disturbed world chance decides how many days are bad. */
function campaignOptions({ days, kind, badRunLength = 1, options }: World, seed: number): CampaignOptions {
  const common = { ...options, seed, days, dayFactorLogSd: ORDINARY[kind] };
  if (kind !== 'disturbed') return common;
  const random = randomStream(seed, 'number of bad days');
  const chances = Math.floor(days / badRunLength);
  const runs = Array.from({ length: chances }, random).filter((u) => u < BAD_SHARE).length;
  return { ...common, badDays: { runs, runLength: badRunLength, factor: BAD_FACTOR } };
}

/** Mean square of the day factor over all days that could have been. */
function longRunSquare({ kind }: World): number {
  const ordinary = Math.exp(2 * ORDINARY[kind] ** 2);
  if (kind !== 'disturbed') return ordinary;
  const { from, to } = BAD_FACTOR;
  return ordinary * (1 - BAD_SHARE + (BAD_SHARE * (from ** 2 + from * to + to ** 2)) / 3);
}

function tryComponent(
  rows: readonly SimulatedOccupation[],
  weights: Float64Array,
  component: Component,
  truth: { readonly constant: number; readonly absolute: number; readonly ppm: number },
): TriedComponent {
  const { reference } = chooseReference(rows, { component, weights });
  const model = fitErrorModel(rows, { component, reference, weights });
  const days = dayModel(rows, model, weights);
  const { ppm, interval } = ppmInterval(model, { model: days });
  const limits = sigmaLimitsMm(model, AT_KM, model.confidence);
  const composed = reference === 'repeatability' ? composeAbsolute(model).model : null;
  return {
    constant: { ...model.constantMm, truth: truth.constant },
    ppm: { ...model.ppm, truth: truth.ppm },
    stated: { ...ppm, truth: truth.ppm },
    fromDayModel: interval !== model.interval,
    sigma10: {
      estimate: sigmaAtMm(model, AT_KM),
      low: limits?.[0] ?? null,
      high: limits?.[1] ?? null,
      truth: Math.hypot(truth.constant, AT_KM * truth.ppm),
    },
    absolute: composed && { ...composed.constantMm, truth: truth.absolute },
    warned: model.notes.some(({ code }) => WARNINGS.has(code)),
  };
}
