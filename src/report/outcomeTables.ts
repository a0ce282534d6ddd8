import type { Results } from '../study/index.js';
import type { Cell, ReportTable } from './tables.js';

/** What rules are used for, as tables: the points of jobs from every base. */
export function outcomeTables(results: Results): ReportTable[] {
  return [jobTable(results)];
}

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
