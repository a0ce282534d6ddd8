/** Length of the chord of an arc on a circle: 2R sin(s/2R). Radii as `meridianRadiusM`, or the earth's mean, 6371 km. */
export function chordOfArcM(arcM: number, radiusM: number): number {
  return 2 * radiusM * Math.sin(arcM / (2 * radiusM));
}

/** Length of the arc over a chord: 2R arcsin(c/2R). NaN for a chord longer than the diameter. */
export function arcOfChordM(chordM: number, radiusM: number): number {
  return 2 * radiusM * Math.asin(chordM / (2 * radiusM));
}
