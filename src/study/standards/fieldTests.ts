import { coordinatesOn } from '../../control/index.js';
import { sigmaAtMm } from '../../fit/index.js';
import {
  type FieldSeries,
  type FieldTestResult,
  type FoundFieldTest,
  figure,
  findFieldTests,
  isoFieldTest,
  lackingOf,
  type StandardCondition,
  type StandardResult,
  sameDeviation,
  specSheetSigmaMm,
} from '../../rule/index.js';
import type { FieldTestSettings } from '../ruleSettings.js';
import type { Study } from '../study.js';
import type { StandardsInput } from './studyStandards.js';

const NAME = 'ISO 17123-8';
const DEFINITION =
  'field test of repeatability: five sets on two rover points 2 to 20 m apart make a series; one series is the simplified test, three, 90 minutes apart or more, the full one';

/** A test with what is stated of it. */
interface Named {
  readonly test: FoundFieldTest;
  readonly settings: Partial<FieldTestSettings>;
}

/** Every field test that is named in the study file, or else that is seen among the shots. */
export function fieldTests(input: StandardsInput, study: Study): StandardResult[] {
  const placeOf = (mark: string, day: string) => {
    const position = coordinatesOn(input.control.marks.get(mark)!, day)?.position;
    return position === undefined || Number.isNaN(position.latitudeDeg + position.heightM) ? null : position;
  };
  const lastDay = (mark: string): string =>
    input.errors.reduce((last, error) => (error.mark === mark && error.day > last ? error.day : last), '');
  const knownPlace = (mark: string) => (input.control.marks.has(mark) ? placeOf(mark, lastDay(mark)) : null);
  const wanted: (FieldTestSettings | null)[] = study.fieldTests.length > 0 ? [...study.fieldTests] : [null];
  const tests: Named[] = [];
  const missing: string[] = [];
  for (const settings of wanted) {
    const found = findFieldTests(input.errors, knownPlace, settings ?? undefined);
    const own = settings === null ? found.tests : found.tests.slice(0, 1);
    tests.push(...own.map((test) => ({ test, settings: settings ?? {} })));
    if (own.length === 0) missing.push(whyNone(settings, found.incomplete));
  }
  const results = tests.map(({ test, settings }) => ({ test, found: judged(test, settings, input, study) }));
  return [
    ...results.map(({ test, found }, k) => entry(test, found, k === 0 ? null : results[k - 1]!)),
    ...missing.map(nothingFound),
  ];
}

interface Judged {
  readonly iso: FieldTestResult;
  /** Where the deviations known beforehand come from. */
  readonly source: string;
}

function judged(
  { series, sets }: FoundFieldTest,
  settings: Partial<FieldTestSettings>,
  { models }: StandardsInput,
  { specSheet }: Study,
): Judged {
  const [first] = series as [FieldSeries];
  const beforehand = (component: 'horizontal' | 'vertical', stated: number | undefined) => {
    if (stated !== undefined) return { mm: stated, source: 'stated in the study file' };
    if (specSheet !== null) {
      return {
        mm: specSheetSigmaMm(specSheet, component, first.baselineKm),
        source: 'from the spec sheet at this distance',
      };
    }
    const model = models.find((each) => each.component === component);
    return {
      mm: model === undefined ? Number.NaN : sigmaAtMm(model, first.baselineKm),
      source: 'from the own fit at this distance, of which the test is a part',
    };
  };
  const [plan, height] = [
    beforehand('horizontal', settings.planMm),
    beforehand('vertical', settings.heightMm),
  ];
  return {
    iso: isoFieldTest(sets, {
      distanceM: settings.distanceM ?? first.distanceM,
      heightDifferenceM: settings.heightDifferenceM ?? first.heightDifferenceM,
      predeterminedMm: { plan: plan.mm, height: height.mm },
    }),
    source: plan.source === height.source ? plan.source : `plan ${plan.source}, height ${height.source}`,
  };
}

function entry(
  { series }: FoundFieldTest,
  { iso, source }: Judged,
  before: { readonly test: FoundFieldTest; readonly found: Judged } | null,
): StandardResult {
  const [first] = series as [FieldSeries];
  const { kind, plan, height, planLimitMm, heightLimitMm, planWithin, heightWithin, sets } = iso;
  const outside = sets.filter(({ withinLimits }) => !withinLimits).length;
  const verdict = (within: boolean | null) => (within === null ? null : within ? 'holds' : 'exceeded');
  const conditions: StandardCondition[] = [
    ...iso.conditions,
    { text: `deviations known beforehand, ${source}`, met: null },
  ];
  const same =
    before !== null &&
    kind === 'full' &&
    before.found.iso.kind === 'full' &&
    JSON.stringify(before.test.series[0]!.marks) === JSON.stringify(first.marks)
      ? `; against the test of ${before.test.series[0]!.day} the plan is ${likeness(plan, before.found.iso.plan)} and the height ${likeness(height, before.found.iso.height)}`
      : '';
  const named = `${kind} test on ${first.marks.map((mark) => JSON.stringify(mark)).join(' and ')}, ${first.day}, rover ${first.rover || 'not named'}, base ${first.base}`;
  return {
    name: NAME,
    standard: iso.standard,
    definition: DEFINITION,
    conditions,
    caution: iso.caution,
    figures: [
      figure(`${named}: plan, √(s_x² + s_y²), ${plan.degreesOfFreedom} degrees of freedom`, plan.mm, {
        component: 'horizontal',
        baselineKm: first.baselineKm,
        allowedMm: planLimitMm,
        verdict: verdict(planWithin),
      }),
      figure(`${named}: height, s_h, ${height.degreesOfFreedom} degrees of freedom`, height.mm, {
        component: 'vertical',
        baselineKm: first.baselineKm,
        allowedMm: heightLimitMm,
        verdict: verdict(heightWithin),
      }),
      figure(
        'largest deviation of a set in distance',
        Math.max(...sets.map(({ distanceErrorMm }) => Math.abs(distanceErrorMm))),
        { component: 'horizontal', baselineKm: first.baselineKm, allowedMm: iso.limitsMm.distance },
      ),
      figure(
        'largest deviation of a set in height difference',
        Math.max(...sets.map(({ heightErrorMm }) => Math.abs(heightErrorMm))),
        { component: 'vertical', baselineKm: first.baselineKm, allowedMm: iso.limitsMm.height },
      ),
    ],
    lacking: lackingOf(conditions),
    outcome:
      `The ${named}: ${outside === 0 ? 'all' : `${sets.length - outside} of`} ${sets.length} sets within their limits` +
      `${kind === 'full' ? `; plan ${plan.mm.toFixed(1)} mm ${tested(planWithin)} ${planLimitMm.toFixed(1)} mm, height ${height.mm.toFixed(1)} mm ${tested(heightWithin)} ${heightLimitMm.toFixed(1)} mm` : '; the simplified test has no statistical test'}${same}.`,
  };
}

const tested = (within: boolean | null): string => (within ? 'is within' : 'exceeds');
const likeness = (a: Parameters<typeof sameDeviation>[0], b: Parameters<typeof sameDeviation>[1]): string =>
  sameDeviation(a, b) ? 'not shown to differ' : 'another one';

function whyNone(settings: FieldTestSettings | null, incomplete: readonly FieldSeries[]): string {
  const [some] = [...incomplete].sort((a, b) => b.sets.length - a.sets.length);
  if (some !== undefined) {
    return `a series of 5 sets in a row: on ${some.marks.map((mark) => JSON.stringify(mark)).join(' and ')} there are ${some.sets.length} on ${some.day}`;
  }
  return settings === null
    ? 'two marks 2 to 20 m apart, known in plan and height, that one rover measured in turn five times in a row'
    : `sets on ${settings.marks.map((mark) => JSON.stringify(mark)).join(' and ')} from ${settings.day} on: both must be known marks, measured in turn by one rover five times in a row`;
}

const nothingFound = (lacking: string): StandardResult => ({
  name: NAME,
  standard: 'ISO 17123-8',
  definition: DEFINITION,
  conditions: [{ text: lacking, met: false }],
  caution:
    'Definition and conditions are given from memory: the printed standard decides, and this is no certificate of conformity.',
  figures: [],
  lacking: [lacking],
  outcome: `No field test is among the shots: it needs ${lacking}.`,
});
