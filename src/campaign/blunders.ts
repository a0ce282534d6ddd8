import { type Random, shuffle } from '../stats/index.js';
import { refuse } from './checks.js';
import { wholeBetween } from './draw.js';
import type { CampaignMark } from './marks.js';
import type { BlunderOptions } from './options.js';
import type { VisitOutcome } from './outcomes.js';
import type { PlannedVisit } from './schedule.js';

/** A mistake of a crew in one visit. */
export interface Blunder {
  readonly kind: 'rod-height' | 'wrong-mark';
  /** What a wrong height of the rod adds, mm. */
  readonly upMm: number;
  /** The mark's name in the log. */
  readonly writtenAs: string;
}

/** Blunders by index into `visits`, each in another visit that got a fix on a known mark. */
export function drawBlunders(
  options: BlunderOptions | null,
  visits: readonly PlannedVisit[],
  outcomes: readonly VisitOutcome[],
  marks: readonly CampaignMark[],
  random: Random,
): Map<number, Blunder> {
  const blunders = new Map<number, Blunder>();
  if (options === null) return blunders;
  const { rodHeights, rodErrorMm, wrongMarks } = options;
  const good = [...visits.keys()].filter((i) => outcomes[i] === 'fixed');
  if (rodHeights + wrongMarks > good.length)
    refuse('blunders', `at most one for each of ${good.length} visits with a fix`, rodHeights + wrongMarks);
  if (wrongMarks > 0 && marks.length < 2) refuse('blunders.wrongMarks', '0 for a single mark', wrongMarks);
  for (const [k, i] of shuffle(good, random)
    .slice(0, rodHeights + wrongMarks)
    .entries()) {
    const { name } = visits[i]!.mark;
    if (k < rodHeights) {
      const upMm = random() < 0.5 ? -rodErrorMm : rodErrorMm;
      blunders.set(i, { kind: 'rod-height', upMm, writtenAs: name });
      continue;
    }
    const others = marks.filter((mark) => mark.name !== name);
    const writtenAs = others[wholeBetween(random, 0, others.length - 1)]!.name;
    blunders.set(i, { kind: 'wrong-mark', upMm: 0, writtenAs });
  }
  return blunders;
}
