import { type Control, coordinatesOn } from '../../control/index.js';
import type { OccupationError } from '../../errors/index.js';
import {
  asprs,
  type CheckPointOptions,
  figure,
  lackingOf,
  nssda,
  type StandardFigure,
  type StandardHead,
  type StandardResult,
} from '../../rule/index.js';
import type { Study } from '../study.js';
import type { StandardsInput } from './studyStandards.js';

const STANDARDS = {
  NSSDA: {
    test: nssda,
    figures: (found: ReturnType<typeof nssda>): StandardFigure[] => [
      horizontal('accuracy at 95 % by the formula of the standard', found.horizontal95Mm),
      horizontal('exact radius of 95 % for these axes', found.exactHorizontal95Mm),
      horizontal('root-mean-square error, radial', known(found.rmseRadialMm)),
      vertical('accuracy at 95 %', found.vertical95Mm),
      vertical('root-mean-square error', known(found.rmseUpMm)),
    ],
  },
  ASPRS: {
    test: asprs,
    figures: (found: ReturnType<typeof asprs>): StandardFigure[] => [
      horizontal('root-mean-square error with that of the check points', found.horizontalRmseMm),
      vertical('root-mean-square error with that of the check points', found.verticalRmseMm),
      figure('root-mean-square error in three dimensions', found.spatialRmseMm),
    ],
  },
} as const;

const horizontal = (what: string, mm: number | null): StandardFigure =>
  figure(what, mm, { component: 'horizontal' });
const vertical = (what: string, mm: number | null): StandardFigure =>
  figure(what, mm, { component: 'vertical' });
const known = (value: number): number | null => (Number.isNaN(value) ? null : value);

/**
 * Accuracy over check points. Suspected wrong fixes are positions that were delivered, so they count; the figures without
 * them stand beside. Marks to which a job was fitted are no check points.
 */
export function checkPointStandard(
  name: keyof typeof STANDARDS,
  { errors, used, control }: StandardsInput,
  { siteMarks }: Study,
): StandardResult {
  const own = (list: readonly OccupationError[]) => list.filter(({ mark }) => !siteMarks.includes(mark));
  const options = statedSigmas(own(errors), control);
  const all = judged(name, own(errors), options);
  const suspects = errors.length > used.length;
  const conditions = [
    ...all.head.conditions,
    { text: 'check points determined independently of what is tested, by a better method', met: null },
  ];
  const failed = conditions.some(({ met }) => met === false);
  return {
    ...all.head,
    conditions,
    name,
    figures: [
      ...all.figures,
      ...(suspects
        ? judged(name, own(used), options).figures.map((one) => ({
            ...one,
            what: `${one.what}, without suspected wrong fixes`,
          }))
        : []),
    ],
    lacking: lackingOf(conditions),
    outcome: outcome(all.figures, failed),
  };
}

function judged(
  name: keyof typeof STANDARDS,
  errors: readonly OccupationError[],
  options: CheckPointOptions,
) {
  const pick = ({ standard, definition, conditions, caution }: StandardHead): StandardHead => ({
    standard,
    definition: `${definition}; shots at all distances of the study together`,
    conditions,
    caution,
  });
  if (name === 'NSSDA') {
    const found = nssda(errors, options);
    return { head: pick(found), figures: STANDARDS.NSSDA.figures(found) };
  }
  const found = asprs(errors, options);
  return { head: pick(found), figures: STANDARDS.ASPRS.figures(found) };
}

function outcome(figures: readonly StandardFigure[], failed: boolean): string {
  const [plan, height] = (['horizontal', 'vertical'] as const).map((component) =>
    figures.find((one) => one.component === component && one.valueMm !== null),
  );
  const parts = [plan, height].flatMap((one) =>
    one === undefined ? [] : [`${one.component} ${one.valueMm!.toFixed(1)} mm (${one.what})`],
  );
  if (parts.length === 0) return 'Nothing can be said: no check point has known errors.';
  return failed
    ? `By its formulas ${parts.join(', ')}; not to be stated as tested, because conditions are not met.`
    : `By its formulas ${parts.join(', ')}.`;
}

/** Root-mean-square of the stated precision of the check points; undefined where one of them states none. */
function statedSigmas(errors: readonly OccupationError[], { marks }: Control): CheckPointOptions {
  const versions = new Set(errors.map(({ mark, day }) => coordinatesOn(marks.get(mark)!, day)!));
  const rms = (values: readonly number[]): number | undefined =>
    values.length === 0 || values.some(Number.isNaN)
      ? undefined
      : Math.sqrt(values.reduce((sum, value) => sum + value ** 2, 0) / values.length);
  const points = [...versions];
  return {
    planSigmaMm: rms(
      points
        .filter(({ position }) => !Number.isNaN(position.latitudeDeg))
        .map(({ horizontalSigmaMm }) => horizontalSigmaMm),
    ),
    heightSigmaMm: rms(
      points
        .filter(({ position }) => !Number.isNaN(position.heightM))
        .map(({ verticalSigmaMm }) => verticalSigmaMm),
    ),
  };
}
