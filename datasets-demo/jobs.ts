/** The points of two invented jobs: name, km east and north of the base, height, and a limit where one is stated. */
const COAST_ROAD: readonly (readonly [string, number, number, number | null, number?])[] = [
  ['km 0', -0.6, 0.9, 152.4],
  ['km 2', -2.3, 1.8, 96.1],
  ['km 4', -4.0, 2.9, 58.7],
  ['km 6', -5.8, 3.4, 41.2],
  ['bridge north', -6.4, 4.1, 22.8, 20],
  ['bridge south', -6.5, 4.0, 22.9, 20],
  ['km 8', -7.3, 4.9, 37.5],
  ['km 10', -8.8, 6.2, 19.3],
  ['km 12', -10.4, 7.3, 24.6],
  ['km 14', -12.1, 8.4, 31],
  ['breakwater', -13.6, 9.3, 3.1],
  ['lighthouse', -16.9, 11.8, null],
];

const DEG_KM = 111.12;

/** As a controller exports points to be staked: header, one point a row, heights and limits only where known. */
export function coastRoadText(base: { readonly latitudeDeg: number; readonly longitudeDeg: number }): string {
  const kmPerDegree = DEG_KM * Math.cos((base.latitudeDeg * Math.PI) / 180);
  const rows = COAST_ROAD.map(([name, eastKm, northKm, heightM, limitMm]) =>
    [
      name,
      (base.latitudeDeg + northKm / DEG_KM).toFixed(7),
      (base.longitudeDeg + eastKm / kmPerDegree).toFixed(7),
      heightM === null ? '' : heightM.toFixed(1),
      limitMm ?? '',
    ].join(','),
  );
  return `point,latitude,longitude,height,limitMm\n${rows.join('\n')}\n`;
}
