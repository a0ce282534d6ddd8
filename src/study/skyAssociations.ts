import { familyAdjusted, rankAssociation, thresholdRule } from '../days/index.js';
import { type Message, message } from '../logs/index.js';
import { randomStream } from '../stats/index.js';
import type { SkyInput } from './skyOfDays.js';
import { skyPoints } from './skyPoints.js';
import {
  SKY_MEASURES,
  SKY_OUTCOMES,
  type SkyAssociation,
  type SkyDay,
  type SkyThreshold,
} from './skyResult.js';

type Told = Pick<SkyInput, 'factors' | 'confidence' | 'seed'>;

/** Every outcome against every measure that is known of any day. Each draws its own chance orders from the seed. */
export function skyAssociations(
  days: readonly SkyDay[],
  { factors, confidence, seed }: Told,
): { associations: SkyAssociation[]; messages: Message[] } {
  const found = SKY_OUTCOMES.flatMap((outcome) =>
    SKY_MEASURES.flatMap((measure) => {
      const points = skyPoints(days, factors, outcome, measure);
      const [values, covariate] = [points.map((one) => one.outcome), points.map((one) => one.measure)];
      if (isUnknown(values) || isUnknown(covariate)) return [];
      const random = randomStream(seed, `${outcome} with ${measure}`);
      return [{ outcome, measure, ...rankAssociation(values, covariate, { random, confidence }) }];
    }),
  );
  const tested = found.filter(({ pValue }) => pValue !== null);
  const adjusted = familyAdjusted(tested.map(({ pValue }) => pValue!));
  const associations = found.map((one): SkyAssociation => {
    const k = tested.indexOf(one);
    return { ...one, adjustedPValue: k < 0 ? null : adjusted[k]! };
  });
  return { associations, messages: tested.length === 0 ? [] : [associationNote(associations, confidence)] };
}

const isUnknown = (values: readonly number[]): boolean => values.every(Number.isNaN);

/** What stands when so many comparisons are made at once. */
function associationNote(associations: readonly SkyAssociation[], confidence: number): Message {
  const tests = associations.filter(({ pValue }) => pValue !== null).length;
  const standing = associations.filter(
    ({ adjustedPValue }) => adjustedPValue !== null && adjustedPValue <= 1 - confidence,
  );
  const pairs = standing.map(
    ({ outcome, measure, spearman }) => `${outcome} with ${measure} (${spearman!.toFixed(2)})`,
  );
  const level = Number((100 * (1 - confidence)).toPrecision(2));
  const finding =
    pairs.length === 0
      ? 'none goes together beyond chance when that is allowed for'
      : `beyond chance, when that is allowed for, go together: ${pairs.join('; ')}`;
  return message(
    'info',
    'sky-associations',
    `Of ${tests} comparisons of days with the sky, about ${level} % would seem to go together by chance alone; ${finding}. Going together names no cause: see first what setup, crew, marks and receiver say of the days.`,
  );
}

/** Thresholds of Kp against the degraded days of each component in which days could be named. */
export function skyThresholds(days: readonly SkyDay[], { factors, confidence, seed }: Told): SkyThreshold[] {
  if (days.every(({ kpMax }) => kpMax === null)) return [];
  return (['horizontal', 'vertical'] as const).flatMap((component): SkyThreshold[] => {
    const named = new Map(
      factors.flatMap((one) =>
        one.component === component && one.degraded !== null ? [[one.day, one.degraded] as const] : [],
      ),
    );
    if (named.size === 0) return [];
    const judged = days.flatMap(({ day, kpMax }) => {
      const degraded = named.get(day);
      return degraded === undefined ? [] : [{ degraded, kpMax: kpMax ?? Number.NaN }];
    });
    const random = randomStream(seed, `${component} days by Kp`);
    return [{ component, ...thresholdRule(judged, { random, confidence }) }];
  });
}
