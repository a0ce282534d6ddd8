/** Degrees clockwise from north, 0 ≤ azimuth < 360, of an angle in radians as `Math.atan2(east, north)` gives it. */
export function azimuthDegrees(radians: number): number {
  const degrees = (radians * 180) / Math.PI;
  const turned = degrees < 0 ? degrees + 360 : degrees;
  // a tiny negative angle rounds up to 360
  return turned === 360 ? 0 : turned;
}
