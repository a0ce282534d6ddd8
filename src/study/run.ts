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
import { type Message, readLogs, type SetAsideRow } from '../logs/index.js';
import { maximumBaseline, noRule } from '../rule/index.js';
import { markMeans } from '../split/index.js';
import { causeMessages } from './causeMessages.js';
import { fitComponents, fitResult } from './fitComponents.js';
import { leaveOutDays } from './leaveOutDays.js';
import { lengthClasses } from './lengthClasses.js';
import { loadControl } from './loadControl.js';
import { readAs } from './readAs.js';
import type { Results } from './results.js';
import type { Study } from './study.js';
import { summarizeRun } from './summarizeRun.js';

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
  /** Results without fits and rules. */
  readonly results: Results;
}

/** A whole run: the results and the tables they rest on. */
export interface StudyRun extends StudyErrors {
  readonly models: readonly ErrorModel[];
}

/**
 * Reads control and logs, forms occupations and computes their errors; fits nothing.
 * @throws InputError when marks or bases cannot be read
 */
export async function readStudyErrors(study: Study, options: RunOptions = {}): Promise<StudyErrors> {
  const { control, messages: controlMessages } = await loadControl(study);
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
  const { errors, setAside } = left;
  const results = await summarizeRun(study, control, {
    formed,
    errors,
    setAside,
    causes,
    messages: [
      ...study.messages,
      ...controlMessages,
      ...formed.messages,
      ...computed.messages,
      ...causeMessages(causes),
      ...checked.messages,
      ...left.messages,
    ],
  });
  const visits = formed.visits.filter(({ day }) => !study.leaveOutDays.includes(day));
  return { control, errors, setAside, visits, results };
}

/**
 * The whole job: logs → occupations → errors → fits → rules. What cannot be given is null or absent, with a message.
 * @throws InputError when marks or bases cannot be read
 */
export async function runStudy(study: Study, options: RunOptions = {}): Promise<StudyRun> {
  const read = await readStudyErrors(study, options);
  const { errors } = read;
  const { models, messages } = fitComponents(errors, study);
  const rules = study.tolerances.map((tolerance) => {
    const model = models.find(({ component }) => component === tolerance.component);
    if (model !== undefined) return maximumBaseline(errors, model, tolerance);
    return noRule(errors, tolerance, `no fit of the ${tolerance.component} component was possible`);
  });
  const results: Results = {
    ...read.results,
    messages: [...read.results.messages, ...messages, ...ruleMessages(rules.length)],
    fits: models.map((model) => fitResult(model, errors)),
    lengthClasses: lengthClasses(errors, read.visits, read.control, study.confidence),
    // A mark on the base itself has no direction; 0 leaves it in the middle of a map.
    marks: markMeans(errors).map((mark) =>
      Number.isNaN(mark.azimuthDeg) ? { ...mark, azimuthDeg: 0 } : mark,
    ),
    rules,
    specSheet: study.specSheet,
  };
  return { ...read, models, results };
}

const ruleMessages = (rules: number): Message[] =>
  rules === 0
    ? []
    : [
        {
          code: 'rule-over-all-days',
          severity: 'info',
          text: 'The rules hold over all days together. How many single days meet them is not judged here: on a worse day fewer positions hold the tolerance.',
          file: null,
          row: null,
          column: null,
        },
      ];
