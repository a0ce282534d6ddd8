/** About the distance of a navigation satellite, km: an error of the base's coordinate turns baselines by its share of it. */
const SATELLITE_DISTANCE_KM = 20_000;

/**
 * What an error of the base's own coordinate adds to every baseline, ppm: its size over the distance of the satellites,
 * so that 20 m make 1 ppm (Rizos 1999, University of New South Wales, section 6.2.6; common practice).
 * @param errorM size of the coordinate error, m
 */
export function assumedBasePpm(errorM: number): number {
  return (errorM / (SATELLITE_DISTANCE_KM * 1000)) * 1e6;
}
