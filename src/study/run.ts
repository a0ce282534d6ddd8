import type { Control } from '../control/index.js';
import {
  commonCauses,
  computeErrors,
  formOccupations,
  type OccupationError,
  type SetAsideOccupation,
  suspectBlunders,
  type Visit,
} from '../errors/index.js';
import type { ErrorModel } from '../fit/index.js';
import { type Message, message, readLogs, type SetAsideRow } from '../logs/index.js';
import type { Rule } from '../rule/index.js';
import { adjustmentWeights } from './adjustmentWeights.js';
import { causeMessages } from './causeMessages.js';
import { studyEvidence } from './evidence.js';
import { fitComponents, formDoubtOf, markSigmaOf } from './fitComponents.js';
import { fitResults, markResults } from './fitResults.js';
import { hoursOfCaution, shotHours } from './hoursOfCaution.js';
import { dayResults, type JudgedDays, judgeDays } from './judgeDays.js';
import { leaveOutDays } from './leaveOutDays.js';
import { lengthClasses } from './lengthClasses.js';
import { loadControl } from './loadControl.js';
import { makeRules, withRuleOptions } from './makeRules.js';
import { movedRules } from './movedRules.js';
import { readAs } from './readAs.js';
import type { Results } from './results.js';
import { screenStudy, suspects, type WrongFixes, withSuspects, wrongFixResults } from './screenStudy.js';
import { siteHeight } from './siteHeight.js';
import { studyStandards } from './standards/index.js';
import type { Study } from './study.js';
import { planJobs, readJobs, type StudyJob } from './studyJobs.js';
import { f107OfDays, studySky } from './studySky.js';
import { summarizeRun } from './summarizeRun.js';
import { testRules } from './testRules.js';
import { visitsAndLengths } from './visitsAndLengths.js';
import { leftOutMessages, withLeftOutDays } from './withLeftOutDays.js';

export interface RunOptions {
  /** Is given every set-aside row as soon as it is known. */
  readonly onSetAside?: ((row: SetAsideRow) => void) | undefined;
  /** Is told of rows read, now and then. */
  readonly onProgress?: ((rowsRead: number) => void) | undefined;
}

/** What reading alone gives: everything up to the errors, with its account. */
export interface StudyErrors {
  readonly control: Control;
  readonly errors: readonly OccupationError[];
  readonly setAside: readonly SetAsideOccupation[];
  readonly visits: readonly Visit[];
  readonly jobs: readonly StudyJob[];
  /** The same errors and visits with the days that the study file leaves out; null when it leaves out none of them. */
  readonly withLeftOut: {
    readonly errors: readonly OccupationError[];
    readonly visits: readonly Visit[];
  } | null;
  /** Results without fits and rules. */
  readonly results: Results;
}

/** A whole run: the results and the tables they rest on. */
export interface StudyRun extends StudyErrors {
  /** What each of the errors counts in the fits; all 1 without screening. Below one half it is a suspected wrong fix. */
  readonly weights: Float64Array;
  /** What the screening found; null where nothing was screened. */
  readonly wrongFixes: WrongFixes | null;
  /** The fits on which the rules rest, one a component. */
  readonly models: readonly ErrorModel[];
  /** Days and hours under these fits. */
  readonly days: readonly JudgedDays[];
}

/**
 * Reads control and logs, forms occupations and computes their errors; fits nothing.
 * @throws InputError when marks or bases cannot be read
 */
export async function readStudyErrors(study: Study, options: RunOptions = {}): Promise<StudyErrors> {
  const { control, messages: controlMessages } = await loadControl(study);
  const asked = await readJobs(study);
  const formed = await formOccupations(readLogs(study.logs, study), control, { ...study, ...options });
  const computed = computeErrors(formed.occupations, control);
  // Causes that all errors share are looked for before anything is rejected for being far off.
  const causes = commonCauses({
    errors: [...computed.errors, ...computed.setAside.map(({ error }) => error)],
    control,
    farOff: formed.farOff,
    ...readAs(study),
  });
  const checked = suspectBlunders(computed.errors, computed.setAside, control);
  const left = leaveOutDays(checked, study);
  // What is explained as a blunder needs no second message.
  const stillFar = checked.setAside.some(({ reason }) => reason === 'error-over-10-m');
  const computedMessages = computed.messages.filter(({ code }) => stillFar || code !== 'error-over-10-m');
  const { errors, setAside } = left;
  const results = await summarizeRun(study, control, {
    formed,
    errors,
    setAside,
    causes,
    messages: [
      ...study.messages,
      ...controlMessages,
      ...asked.messages,
      ...formed.messages,
      ...computedMessages,
      ...causeMessages(causes),
      ...checked.messages,
      ...left.messages,
    ],
  });
  const visits = formed.visits.filter(({ day }) => !study.leaveOutDays.includes(day));
  const withLeftOut =
    errors.length === checked.errors.length ? null : { errors: checked.errors, visits: formed.visits };
  return { control, errors, setAside, visits, withLeftOut, jobs: asked.jobs, results };
}

/**
 * The whole job: logs → occupations → errors → fits → rules. What cannot be given is null or absent, with a message.
 * @throws InputError when marks or bases cannot be read
 */
export async function runStudy(study: Study, options: RunOptions = {}): Promise<StudyRun> {
  const read = await readStudyErrors(study, options);
  const { errors } = read;
  const wrongFixes = screenStudy(errors, study);
  const weights = wrongFixes?.weights ?? null;
  const { components, messages } = fitComponents(errors, weights, study);
  const models = components.map(({ basis }) => basis);
  const judged = judgeDays(errors, weights, read.visits, components, study);
  const evidence = studyEvidence(errors, weights, components, study);
  const used = weights === null ? errors : errors.filter((_, i) => weights[i]! >= 0.5);
  const sky = await studySky(study, read, dayResults(judged).dailyFactors);
  const site = siteHeight(used, evidence.results.terms, study);
  const ground = withRuleOptions({
    errors,
    used,
    visits: read.visits,
    control: read.control,
    models,
    doubts: new Map(components.map((each) => [each.component, formDoubtOf(each)])),
    days: judged,
    height: site.height,
    markSigmaMm: new Map(components.map((each) => [each.component, markSigmaOf(each)])),
    f107: f107OfDays(sky.sky),
    wrongFixes,
  });
  const made = makeRules(ground, study);
  const tested = testRules(ground, study);
  const planned = planJobs(read.jobs, ground, study);
  const visited = visitsAndLengths(ground, made.rules, weights, study.seed);
  const fitted = fitResults(components, errors, wrongFixes, judged);
  const { withLeftOut } = read;
  const leftOut = withLeftOut === null ? null : withLeftOutDays(withLeftOut, ground, study);
  const results: Results = {
    ...read.results,
    messages: [
      ...read.results.messages,
      ...(wrongFixes?.messages ?? []),
      ...messages,
      ...judged.flatMap((each) => each.messages),
      ...evidence.messages,
      ...site.messages,
      ...sky.messages,
      ...tested.messages,
      ...planned.messages,
      ...visited.messages,
      ...ruleMessages(made.rules),
      ...(leftOut === null ? [] : leftOutMessages(leftOut, { ...fitted, ...made })),
    ],
    occupations: withSuspects(read.results.occupations, errors.length - used.length),
    ...fitted,
    ...dayResults(judged),
    hoursOfCaution: hoursOfCaution(dayResults(judged).timeOfDay, used, read.control, study),
    shotHours: shotHours(used, read.control, study),
    ...evidence.results,
    wrongFixes: wrongFixResults(errors, wrongFixes),
    lengthClasses: lengthClasses(used, read.visits, read.control, study),
    marks: markResults(used, components),
    ...made,
    leftOut,
    ruleMoves: movedRules(ground, components, made.rules),
    adjustmentWeights: adjustmentWeights(fitted.fits, study.centringSigmaMm),
    backTest: tested.backTest,
    jobs: planned.jobs,
    standards: studyStandards({ ...ground, weights, files: read.results.files }, study),
    ...visited.results,
    sky: sky.sky,
  };
  const setAside = [...read.setAside, ...suspects(errors, wrongFixes)];
  return {
    ...read,
    setAside,
    weights: weights ?? new Float64Array(errors.length).fill(1),
    wrongFixes,
    models,
    days: judged,
    results,
  };
}

/** What must be said of rules that are not made for single days. */
const ruleMessages = (rules: readonly Rule[]): Message[] =>
  rules.every(({ method, maximumBaselineKm }) => method === 'day-model' || maximumBaselineKm === null)
    ? []
    : [
        message(
          'info',
          'rule-over-all-days',
          'Rules without a day model hold over all days together. How many single days meet them is not judged: on a worse day fewer positions hold the tolerance.',
        ),
      ];
