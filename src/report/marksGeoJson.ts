import type { StudyRun } from '../study/index.js';

/**
 * The marks with their mean errors as GeoJSON (RFC 7946): longitude and latitude in degrees, height in metres, as the
 * study reads them. A mark without a plan position is left out; one measured from several bases stands once for each.
 */
export function marksGeoJson({ control, results }: StudyRun): string {
  const features = results.marks.flatMap((mean) => {
    const position = control.marks.get(mean.mark)?.position;
    if (position === undefined || Number.isNaN(position.latitudeDeg)) return [];
    const { latitudeDeg, longitudeDeg, heightM } = position;
    const { mark, base, baselineKm, azimuthDeg, occupations, days, east, north, up, se, standsOut } = mean;
    return [
      {
        type: 'Feature',
        geometry: {
          type: 'Point',
          coordinates: [
            degrees(longitudeDeg),
            degrees(latitudeDeg),
            ...(Number.isNaN(heightM) ? [] : [Number(heightM.toFixed(4))]),
          ],
        },
        properties: {
          mark,
          base,
          baselineKm,
          azimuthDeg,
          occupations,
          days,
          eastMm: east,
          northMm: north,
          upMm: up,
          seEastMm: se.east,
          seNorthMm: se.north,
          seUpMm: se.up,
          standsOutInPlan: standsOut.horizontal,
          standsOutInHeight: standsOut.vertical,
          heights: results.heights,
        },
      },
    ];
  });
  return `${JSON.stringify({ type: 'FeatureCollection', features }, null, 1)}\n`;
}

/** Nine decimals are a tenth of a millimetre. */
const degrees = (value: number): number => Number(value.toFixed(9));
