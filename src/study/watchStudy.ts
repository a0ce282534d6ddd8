import { readFile } from 'node:fs/promises';
import { screenWrongFixes } from '../fit/index.js';
import { inputError, type Message, quoted } from '../logs/index.js';
import { type Watch, watchDays } from '../rule/index.js';
import { lateMessages } from './lateOccupations.js';
import type { Results } from './results.js';
import { resultsSchema } from './resultsSchema.js';
import { type RunOptions, readStudyErrors } from './run.js';
import { suspectsOf } from './screenStudy.js';
import type { Study } from './study.js';
import { type EarlierRun, type WatchMonth, watchMonth } from './watchMonth.js';

/** New days of a study held against the models of an earlier run. */
export interface WatchRun {
  /** Account of the rows, and messages. */
  readonly results: Results;
  /** One entry for each component that can be watched. */
  readonly watches: readonly Watch[];
  /** Components that cannot be, with the reason. */
  readonly unwatched: readonly { readonly component: Watch['component']; readonly reason: string }[];
  /** What happened on the new days. */
  readonly month: WatchMonth;
  /** Those that the earlier run did not tell. */
  readonly messages: readonly Message[];
}

/**
 * Reads the results of an earlier run.
 * @throws InputError when the file is missing, or holds no results of this version
 */
export async function readResults(path: string): Promise<Results> {
  let text: string;
  try {
    text = await readFile(path, 'utf8');
  } catch {
    throw inputError(
      'no-results',
      `Expected a results.json, came a path that cannot be read: ${quoted(path)}. Run the study first, and name its results.json.`,
      { file: path },
    );
  }
  const parsed = resultsSchema.safeParse(jsonOf(text, path));
  if (parsed.success) return parsed.data as Results;
  const [first] = parsed.error.issues;
  throw inputError(
    'no-results',
    `Expected results of this version of ppmwise, came a file that differs at "${first!.path.join('.')}". Run the study again, and name its results.json.`,
    { file: path },
  );
}

function jsonOf(text: string, path: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    throw inputError(
      'no-results',
      'Expected a results.json, came a file that is no JSON. Run the study first, and name its results.json.',
      { file: path },
    );
  }
}

/** Fewer new occupations are too few to look for wrong fixes among them. */
const FEWEST_SCREENED = 20;

/**
 * Holds the days of a study that an earlier run has not seen against its models: days outside, drift of constant and
 * ppm, and whether it is time to fit again.
 * @throws InputError when marks or bases cannot be read
 */
export async function watchStudy(
  earlier: EarlierRun,
  study: Study,
  options: RunOptions = {},
): Promise<WatchRun> {
  const { errors, results, visits, setAside } = await readStudyErrors(study, options);
  const screening =
    study.screen && errors.length >= FEWEST_SCREENED
      ? screenWrongFixes(errors, { confidence: study.confidence })
      : null;
  const weights = screening === null || screening.refused ? undefined : screening.weights;
  const before = new Set(earlier.messages.map(sameMessage));
  const told = [...results.messages, ...(screening?.notes ?? [])];
  const fresh = told.filter((message) => !before.has(sameMessage(message)));
  const month = watchMonth(earlier, {
    results,
    errors,
    weights,
    setAside: [...setAside, ...(weights === undefined ? [] : suspectsOf(errors, screening!))],
    visits,
    messagesToldBefore: told.length - fresh.length,
  });
  return {
    results,
    watches: earlier.watch.flatMap(({ basis }) =>
      basis === null ? [] : [watchDays(basis, errors, { weights })],
    ),
    unwatched: earlier.watch.flatMap(({ component, reason }) =>
      reason === null ? [] : [{ component, reason }],
    ),
    month,
    messages: [...lateMessages(month.late, month.after), ...fresh],
  };
}

const sameMessage = ({ code, text, file, row }: Message): string => JSON.stringify([code, text, file, row]);
