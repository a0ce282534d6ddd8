/**
 * What the ppm is multiplied by at a solar hour: exp(rise (2 cos(2π(t − 14)/24) − 1)), highest at 14 h
 * with exp(rise); 1 at all hours for a rise of 0.
 */
export function hourFactor(rise: number, solarHour: number): number {
  return Math.exp(rise * (2 * Math.cos((2 * Math.PI * (solarHour - 14)) / 24) - 1));
}
