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
  type PlaceOfMark,
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
  const knownPlace: PlaceOfMark = (mark, day) => (input.control.marks.has(mark) ? placeOf(mark, day) : null);
  const wanted: (FieldTestSettings | null)[] = study.fieldTests.length > 0 ? [...study.fieldTests] : [null];
  const tests: Named[] = [];
  const besides: StandardResult[] = [];
  for (const settings of wanted) {
    const { tests: all, incomplete } = findFieldTests(input.errors, knownPlace, settings ?? undefined);
    const own = settings === null ? all : all.filter(({ series }) => series[0]!.day === settings.day);
    tests.push(...own.map((test) => ({ test, settings: settings ?? {} })));
    if (own.length === 0) besides.push(nothingFound(whyNone(settings, incomplete, all)));
    else if (settings === null && incomplete.length > 0) besides.push(brokenOff(incomplete));
  }
  const results = tests.map(({ test, settings }) => ({ test, found: judged(test, settings, input, study) }));
  return [...results.map((result) => entry(result, fullBefore(result, results))), ...besides];
}

interface Result {
  readonly test: FoundFieldTest;
  readonly found: Judged;
}

/** The full test before a full one of the same pair and rover: the standard compares two. */
function fullBefore({ test, found }: Result, results: readonly Result[]): Result | null {
  const own = test.series[0]!;
  const alike = (other: Result): boolean => {
    const { marks, rover, startMs } = other.test.series[0]!;
    const same = JSON.stringify([marks, rover]) === JSON.stringify([own.marks, own.rover]);
    return same && other.found.iso.kind === 'full' && startMs < own.startMs;
  };
  if (found.iso.kind !== 'full') return null;
  return results
    .filter(alike)
    .reduce<Result | null>(
      (last, each) =>
        last === null || each.test.series[0]!.startMs > last.test.series[0]!.startMs ? each : last,
      null,
    );
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

function entry({ test: { series }, found: { iso, source } }: Result, before: Result | null): StandardResult {
  const [first] = series as [FieldSeries];
  const { kind, plan, height, planLimitMm, heightLimitMm, planWithin, heightWithin, sets } = iso;
  const outside = sets.filter(({ withinLimits }) => !withinLimits).length;
  const verdict = (within: boolean | null) => (within === null ? null : within ? 'holds' : 'exceeded');
  const conditions: StandardCondition[] = [
    ...iso.conditions,
    { text: `deviations known beforehand, ${source}`, met: null },
  ];
  const same =
    before !== null
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

function whyNone(
  settings: FieldTestSettings | null,
  incomplete: readonly FieldSeries[],
  others: readonly FoundFieldTest[],
): string {
  if (settings !== null && others.length > 0) {
    return `a first series on ${settings.day}, as fieldTests states: the next one on ${settings.marks.map((mark) => JSON.stringify(mark)).join(' and ')} begins on ${others[0]!.series[0]!.day}`;
  }
  const [some] = [...incomplete].sort((a, b) => b.sets.length - a.sets.length);
  if (some !== undefined) {
    return `a series of 5 sets in a row: ${setsOf(some)}`;
  }
  return settings === null
    ? 'two marks 2 to 20 m apart, known in plan and height, that one rover measured in turn five times in a row'
    : `sets on ${settings.marks.map((mark) => JSON.stringify(mark)).join(' and ')} from ${settings.day} on: both must be known marks, measured in turn by one rover five times in a row`;
}

const setsOf = ({ marks, sets, day }: FieldSeries): string =>
  `on ${marks.map((mark) => JSON.stringify(mark)).join(' and ')} there are ${sets.length} on ${day}`;

/** More than these are only counted. */
const MOST_NAMED = 5;

/** Series beside a test that took no part in any. */
function brokenOff(incomplete: readonly FieldSeries[]): StandardResult {
  const more = incomplete.length - MOST_NAMED;
  const named = incomplete.slice(0, MOST_NAMED).map(setsOf).join('; ');
  const text = `series of 5 sets in a row: ${named}${more > 0 ? `; ${more} more` : ''}`;
  return {
    ...nothingFound(text),
    outcome: `Series that broke off before the fifth set took no part in a test: ${named}${more > 0 ? `; ${more} more` : ''}.`,
  };
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
