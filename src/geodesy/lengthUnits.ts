/** Units of length met in logs and mark lists. */
export type LengthUnit = 'metre' | 'international-foot' | 'us-survey-foot';

const METRES_PER: Readonly<Record<LengthUnit, number>> = {
  metre: 1,
  'international-foot': 0.3048,
  'us-survey-foot': 1200 / 3937,
};

/**
 * Metres in one unit, exact by definition: international foot 0.3048 m, US survey foot 1200/3937 m (Federal Register
 * 85 FR 62698; deprecated after 2022, still in older coordinates).
 */
export function metresPer(unit: LengthUnit): number {
  return METRES_PER[unit];
}

/** Millimetres that `ppm` parts per million come to over `km` kilometres: 1 ppm is 1 mm per km. */
export function distanceErrorMm(ppm: number, km: number): number {
  return ppm * km;
}
