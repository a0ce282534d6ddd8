import type { JobResult, Results } from '../study/index.js';

/**
 * The points of jobs and the bases as GeoJSON (RFC 7946): longitude and latitude in degrees, height in metres. A point
 * stands once for each tolerance under which it was asked for, a base once for each with how far the rule reaches.
 */
export function jobsGeoJson({ jobs }: Results): string {
  const features = jobs.flatMap((job) => [...job.bases.map(baseOf(job)), ...job.points.map(pointOf(job))]);
  return `${JSON.stringify({ type: 'FeatureCollection', features }, null, 1)}\n`;
}

const demandOf = ({ file, component, limitMm, share, dayShare }: JobResult) => ({
  file,
  component,
  limitMm,
  share,
  dayShare,
});

const baseOf =
  (job: JobResult) =>
  ({ base, maximumBaselineKm, reason, baseOfRule, ...place }: JobResult['bases'][number]) => ({
    type: 'Feature',
    geometry: geometry(place),
    properties: { kind: 'base', base, ...demandOf(job), maximumBaselineKm, reason, baseOfRule },
  });

const pointOf =
  (job: JobResult) =>
  ({ latitudeDeg, longitudeDeg, heightM, ...point }: JobResult['points'][number]) => ({
    type: 'Feature',
    geometry: geometry({ latitudeDeg, longitudeDeg, heightM }),
    properties: { kind: 'point', ...demandOf(job), ...point },
  });

function geometry({
  latitudeDeg,
  longitudeDeg,
  heightM,
}: Pick<JobResult['points'][number], 'latitudeDeg' | 'longitudeDeg' | 'heightM'>) {
  // Nine decimals are a tenth of a millimetre.
  const coordinates = [longitudeDeg, latitudeDeg].map((value) => Number(value.toFixed(9)));
  return {
    type: 'Point',
    coordinates: heightM === null ? coordinates : [...coordinates, Number(heightM.toFixed(4))],
  };
}
