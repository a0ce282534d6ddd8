import { InputError } from '../../logs/index.js';
import {
  figure,
  lackingOf,
  type RelativeClass,
  relativePrecision,
  type StandardFigure,
  type StandardResult,
} from '../../rule/index.js';
import type { StandardsInput } from './studyStandards.js';

const NAME = 'land-title';

/** The limit between points of a property, from pairs of marks of one setup close in time. */
export function landTitle({ errors, models, weights }: StandardsInput): StandardResult[] {
  const model = models.find(({ component }) => component === 'horizontal');
  const told =
    model === undefined
      ? 'no horizontal fit was possible'
      : possible(() => relativePrecision(errors, model, { weights: weights ?? undefined }));
  if (typeof told === 'string') {
    return [
      {
        name: NAME,
        standard: 'relative positional precision of land title surveys (ALTA/NSPS 2016, 2021)',
        definition:
          'semi-major axis of the 95 % ellipse between points of the property, at most 20 mm + 50 ppm of their distance, added linearly',
        conditions: [{ text: told, met: false }],
        caution:
          'Definition and conditions are given from memory: the printed standard decides, and this is no certificate of conformity.',
        figures: [],
        lacking: [told],
        outcome: `Nothing can be said: ${told}.`,
      },
    ];
  }
  const { limit: _, classes, ...head } = told;
  return [
    {
      ...head,
      name: NAME,
      figures: classes.map(classFigure),
      lacking: lackingOf(head.conditions),
      outcome: outcome(classes),
    },
  ];
}

const metres = ({ fromM, toM }: RelativeClass): string => `${fromM} to ${toM} m`;

const classFigure = (one: RelativeClass): StandardFigure =>
  figure(
    `semi-major axis at 95 % between marks ${metres(one)} apart, ${one.pairs} pairs on ${one.days} days`,
    one.semiMajorMm,
    {
      component: 'horizontal',
      lowMm: one.lowMm,
      highMm: one.highMm,
      allowedMm: one.allowedMm,
      verdict: one.verdict,
    },
  );

function outcome(classes: readonly RelativeClass[]): string {
  if (classes.length === 0) {
    return 'Nothing can be said: no two marks were shot from one setup within half an hour. Shoot marks of the size of a property one after the other.';
  }
  const words = (verdict: RelativeClass['verdict'], text: string): string[] => {
    const own = classes.filter((one) => one.verdict === verdict);
    return own.length === 0 ? [] : [`${text} between marks ${own.map(metres).join(', ')} apart`];
  };
  return `The limit ${[
    ...words('holds', 'holds'),
    ...words('exceeded', 'is exceeded'),
    ...words('cannot be told', 'cannot be judged'),
  ].join('; ')}.`;
}

function possible<T>(make: () => T): T | string {
  try {
    return make();
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    return error.messages[0]!.text.replace(/\.$/, '');
  }
}
