import type { Results } from '../study/index.js';
import type { Cell, ReportTable } from './tables.js';

/** What rules are used for, as tables: promises, limits of two bases, jobs from every base, standards, second visits, lengths of occupations. */
export function outcomeTables(results: Results): ReportTable[] {
  return [
    promiseTable(results),
    twoBasesTable(results),
    jobTable(results),
    standardTable(results),
    visitTable(results),
    lengthTable(results),
  ];
}

const promiseTable = ({ promises }: Results): ReportTable => ({
  name: 'promises',
  header: [
    'component',
    'baselineKm',
    'share',
    'dayShare',
    'confidence',
    'method',
    'limitMm',
    'bestEstimateMm',
    'reason',
  ],
  rows: promises.map((one): Cell[] => [
    one.component,
    one.baselineKm,
    one.share,
    one.dayShare,
    one.confidence,
    one.method,
    one.limitMm,
    one.bestEstimateMm,
    one.reason,
  ]),
});

const twoBasesTable = ({ checkShotLimits }: Results): ReportTable => ({
  name: 'check-shot-two-bases',
  header: ['component', 'firstKm', 'secondKm', 'limitMm', 'alarmShare'],
  rows: checkShotLimits.flatMap(({ component, twoBases, alarmShare }) =>
    twoBases.map((one): Cell[] => [component, one.firstKm, one.secondKm, one.limitMm, alarmShare]),
  ),
});

const jobTable = ({ jobs }: Results): ReportTable => ({
  name: 'jobs',
  header: [
    'file',
    'component',
    'limitMm',
    'share',
    'dayShare',
    'point',
    'latitudeDeg',
    'longitudeDeg',
    'base',
    'baselineKm',
    'heightDifferenceM',
    'maximumBaselineKm',
    'holds',
    'promisedMm',
    'bestBase',
    'needsAnotherBase',
    'reason',
  ],
  rows: jobs.flatMap((job) => {
    const points = new Map(job.points.map((point) => [point.point, point]));
    const reachOf = new Map(job.bases.map(({ base, maximumBaselineKm }) => [base, maximumBaselineKm]));
    return job.reaches.map((reach): Cell[] => {
      const point = points.get(reach.point)!;
      return [
        job.file,
        job.component,
        job.limitMm,
        job.share,
        job.dayShare,
        reach.point,
        point.latitudeDeg,
        point.longitudeDeg,
        reach.base,
        reach.baselineKm,
        reach.heightDifferenceM,
        reachOf.get(reach.base)!,
        reach.holds,
        reach.promisedMm,
        point.bestBase === reach.base,
        point.needsAnotherBase,
        reach.reason,
      ];
    });
  }),
});

const standardTable = ({ standards }: Results): ReportTable => ({
  name: 'standards',
  header: [
    'name',
    'standard',
    'what',
    'component',
    'baselineKm',
    'valueMm',
    'lowMm',
    'highMm',
    'allowedMm',
    'verdict',
    'lacking',
    'outcome',
  ],
  rows: standards.flatMap(({ name, standard, figures, lacking, outcome }) => {
    const told = [lacking.join('; '), outcome];
    // A standard without a number still has a line that says what is lacking.
    if (figures.length === 0) return [[name, standard, ...Array<Cell>(8).fill(null), ...told]];
    return figures.map((one): Cell[] => [
      name,
      standard,
      one.what,
      one.component,
      one.baselineKm,
      one.valueMm,
      one.lowMm,
      one.highMm,
      one.allowedMm,
      one.verdict,
      ...told,
    ]);
  }),
});

const visitTable = ({ secondVisits }: Results): ReportTable => ({
  name: 'second-visits',
  header: [
    'component',
    'baselineKm',
    'minutes',
    'meanFactor',
    'meanFactorLow',
    'meanFactorHigh',
    'differenceFactor',
    'differenceFactorLow',
    'differenceFactorHigh',
    'differenceLimitMm',
    'alarmShare',
  ],
  rows: secondVisits.flatMap(({ component, alarmShare, visits }) =>
    visits.map(({ baselineKm, minutes, factor, differenceFactor, differenceLimitMm }): Cell[] => [
      component,
      baselineKm,
      minutes,
      factor.estimate,
      factor.low,
      factor.high,
      differenceFactor.estimate,
      differenceFactor.low,
      differenceFactor.high,
      differenceLimitMm,
      alarmShare,
    ]),
  ),
});

const lengthTable = ({ errorByOccupationLength }: Results): ReportTable => ({
  name: 'occupation-length',
  header: ['component', 'fromEpochs', 'toEpochs', 'occupations', 'days', 'ratio', 'ratioLow', 'ratioHigh'],
  rows: errorByOccupationLength.map(({ ratio, ...one }): Cell[] => [
    one.component,
    one.fromEpochs,
    one.toEpochs,
    one.occupations,
    one.days,
    ratio.estimate,
    ratio.low,
    ratio.high,
  ]),
});
