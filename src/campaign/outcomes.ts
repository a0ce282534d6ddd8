import type { Random } from '../stats/index.js';
import type { CampaignMark } from './marks.js';
import type { CampaignSettings } from './options.js';
import type { PlannedVisit } from './schedule.js';
import { shareAtKm } from './shareAtKm.js';

/** How a visit ended: with a fix, without one, or with a fix under a mark name that nobody knows; or, by a blunder, under another mark's name. */
export type VisitOutcome = 'fixed' | 'no-fix' | 'unknown-mark';

/** Draws every visit's outcome; `random` is used twice a visit, so shares do not disturb each other. */
export function visitOutcomes(
  settings: CampaignSettings,
  visits: readonly PlannedVisit[],
  random: Random,
): VisitOutcome[] {
  return visits.map(({ mark }) => {
    const noFix = random() < shareAtKm(settings.noFix, mark.baselineKm);
    const mistyped = random() < settings.unknownMarkShare;
    if (noFix) return 'no-fix';
    return mistyped ? 'unknown-mark' : 'fixed';
  });
}

/** A mistyped name of a mark that is no other mark's name: a hyphen before its digits, doubled if need be. */
export function mistypedName(name: string, marks: readonly Pick<CampaignMark, 'name'>[]): string {
  const taken = new Set(marks.map((mark) => mark.name));
  const digits = /\d*$/.exec(name)?.[0] ?? '';
  const stem = name.slice(0, name.length - digits.length);
  let hyphens = '-';
  while (taken.has(stem + hyphens + digits)) hyphens += '-';
  return stem + hyphens + digits;
}
