/** The same meridian in (−180, 180], from a longitude of any turn (0 to 360, say). */
export function wrappedLongitude(longitudeDeg: number): number {
  const turned = longitudeDeg - 360 * Math.ceil((longitudeDeg - 180) / 360);
  return turned === -180 ? 180 : turned;
}
