import { type RequestedPoint, readJobPoints } from '../control/index.js';
import type { Component, ErrorModel } from '../fit/index.js';
import { type Message, message } from '../logs/index.js';
import {
  noRule,
  promiser,
  type RuleFromBase,
  type RuleOptions,
  reachPoints,
  ruleFinder,
  type Tolerance,
} from '../rule/index.js';
import { baseErrors } from './baseErrors.js';
import type { RuleInput } from './makeRules.js';
import type { JobResult } from './ruleResultTypes.js';
import type { JobFile, Study } from './study.js';

/** A job with its points as read. */
export interface StudyJob extends Pick<JobFile, 'file' | 'limitMm'> {
  readonly points: readonly RequestedPoint[];
}

/** @throws InputError when a file of points cannot be understood */
export async function readJobs(study: Study): Promise<{ jobs: StudyJob[]; messages: Message[] }> {
  const jobs: StudyJob[] = [];
  const messages: Message[] = [];
  for (const job of study.jobs) {
    const read = await readJobPoints(job);
    jobs.push({ file: job.file, limitMm: job.limitMm, points: read.points });
    messages.push(...read.messages);
  }
  return { jobs, messages };
}

const DEFAULT: Omit<Tolerance, 'limitMm'> = {
  component: 'horizontal',
  share: 0.95,
  dayShare: 0.9,
  confidence: 0.95,
};

/**
 * Which base reaches which point of each job: under every tolerance of the study, or under a limit that the job or a
 * point states for itself. A base whose coordinates are known worse than those behind the rules has shorter ones.
 */
export function planJobs(
  jobs: readonly StudyJob[],
  input: RuleInput,
  { tolerances }: Study,
): { jobs: JobResult[]; messages: Message[] } {
  if (jobs.length === 0) return { jobs: [], messages: [] };
  const rulesOf = remembered((tolerance: Tolerance) => rulesFromBases(input, tolerance));
  const bases = [...input.control.bases.values()];
  const withoutLimit = jobs.filter(({ limitMm, points }) =>
    points.some((point) => point.limitMm === null && limitMm === null),
  );
  const results = jobs.flatMap(({ file, limitMm, points }) =>
    demands(points, limitMm, tolerances).map(({ tolerance, wanted }): JobResult => {
      const { general, fromBase } = rulesOf(tolerance);
      return { file, ...reachPoints(wanted, bases, general, fromBase) };
    }),
  );
  const missing = tolerances.length === 0 && withoutLimit.length > 0;
  return {
    jobs: results,
    messages: [...(missing ? [noTolerance(withoutLimit)] : []), ...results.flatMap(steepPoints(input))],
  };
}

/** The tolerances under which points are asked for, each with its points. */
function demands(
  points: readonly RequestedPoint[],
  ofJob: number | null,
  tolerances: readonly Tolerance[],
): { tolerance: Tolerance; wanted: RequestedPoint[] }[] {
  const own = new Map<number, RequestedPoint[]>();
  const common: RequestedPoint[] = [];
  for (const point of points) {
    const limitMm = point.limitMm ?? ofJob;
    if (limitMm === null) common.push(point);
    else own.set(limitMm, [...(own.get(limitMm) ?? []), point]);
  }
  const horizontal = tolerances.find(({ component }) => component === 'horizontal') ?? DEFAULT;
  return [
    ...(common.length === 0 ? [] : tolerances.map((tolerance) => ({ tolerance, wanted: common }))),
    ...[...own].map(([limitMm, wanted]) => ({ tolerance: { ...horizontal, limitMm }, wanted })),
  ];
}

/** The rule of a tolerance in general and from single bases. */
function rulesFromBases(input: RuleInput, tolerance: Tolerance) {
  const { used, models, options, control } = input;
  const model = models.find(({ component }) => component === tolerance.component);
  if (model === undefined) {
    const reason = `no fit of the ${tolerance.component} component was possible`;
    const general: RuleFromBase = {
      rule: noRule(used, tolerance, reason),
      promise: (baselineKm) => ({
        ...tolerance,
        baselineKm,
        method: 'pooled',
        limitMm: null,
        bestEstimateMm: null,
        reason,
      }),
    };
    return { general, fromBase: () => general };
  }
  const common = options.get(model.component)!;
  const ruleWith = (own: RuleOptions): RuleFromBase => ({
    rule: ruleFinder(used, model, own)(tolerance),
    promise: promiser(used, model, { ...own, ...demandOf(tolerance) }),
  });
  const general = ruleWith(common);
  const worse = remembered((of: Pick<RuleOptions, 'baseSigmaMm' | 'basePpm'>) =>
    ruleWith({ ...common, ...of }),
  );
  return {
    general,
    fromBase(name: string): RuleFromBase {
      const of = worseErrors(model, common, [control.bases.get(name)!]);
      return of === null ? general : worse(of);
    },
  };
}

const demandOf = ({ share, dayShare, confidence }: Tolerance) => ({ share, dayShare, confidence });

/** What a base adds more than the rule reckons with; null where it adds no more. */
function worseErrors(
  { component }: ErrorModel<Component>,
  { baseSigmaMm = 0, basePpm = 0 }: RuleOptions,
  bases: Parameters<typeof baseErrors>[1],
): Pick<RuleOptions, 'baseSigmaMm' | 'basePpm'> | null {
  const own = baseErrors(component, bases);
  if ((own.baseSigmaMm ?? 0) <= baseSigmaMm && (own.basePpm ?? 0) <= basePpm) return null;
  const larger = (a: number, b = 0): number | undefined => Math.max(a, b) || undefined;
  return { baseSigmaMm: larger(baseSigmaMm, own.baseSigmaMm), basePpm: larger(basePpm, own.basePpm) };
}

/** A function of plain values that computes each only once. */
function remembered<Key extends object, Value>(compute: (key: Key) => Value): (key: Key) => Value {
  const known = new Map<string, Value>();
  return (key) => {
    const text = JSON.stringify(key);
    if (!known.has(text)) known.set(text, compute(key));
    return known.get(text)!;
  };
}

/** Points of a vertical plan that lie higher above a base than the rule knows of; said once for each file. */
function steepPoints({ used, height }: RuleInput): (job: JobResult) => Message[] {
  const told = new Set<string>();
  const seenM = used
    .filter(({ up, heightDifferenceM }) => !Number.isNaN(up + heightDifferenceM))
    .reduce((most, { heightDifferenceM }) => Math.max(most, Math.abs(heightDifferenceM)), 0);
  const knownM = height === undefined ? seenM : Math.abs(height.differenceM);
  return ({ file, component, reaches }) => {
    const heights = reaches
      .filter(({ holds }) => holds === true)
      .map(({ heightDifferenceM }) => Math.abs(heightDifferenceM ?? 0));
    const most = Math.max(0, ...heights);
    if (component !== 'vertical' || most <= knownM || told.has(file)) return [];
    told.add(file);
    const rule =
      height === undefined
        ? `the check shots at most ${knownM.toFixed(0)} m`
        : `the vertical rules are for ${knownM.toFixed(0)} m`;
    return [
      message(
        'warning',
        'job-points-steep',
        `Points of ${JSON.stringify(file)} lie up to ${most.toFixed(0)} m above or below a base that reaches them, and ${rule}: what is said of their heights does not hold there. State the larger height difference under site, or shoot checks at such heights.`,
      ),
    ];
  };
}

const noTolerance = (jobs: readonly StudyJob[]): Message =>
  message(
    'warning',
    'job-without-tolerance',
    `Expected a limit for the points of ${jobs.map(({ file }) => JSON.stringify(file)).join(', ')}, came none. State tolerances in the study file, limitMm of the job, or a column limitMm.`,
  );
