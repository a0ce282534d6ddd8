import type { ShareByDistance } from './options.js';

/**
 * The share at a distance: log share is a straight line over log distance through the shares at 1 and
 * 12 km; below 0.5 km it stays as at 0.5 km, and it never exceeds one half. Both shares 0 give 0.
 */
export function shareAtKm(share: ShareByDistance, baselineKm: number): number {
  if (share.shareAt1Km === 0) return 0;
  const slope = Math.log(share.shareAt12Km / share.shareAt1Km) / Math.log(12);
  return Math.min(0.5, share.shareAt1Km * Math.max(baselineKm, 0.5) ** slope);
}
