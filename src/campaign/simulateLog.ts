import { randomStream } from '../stats/index.js';
import { refuse } from './checks.js';
import { type DrawnVisit, drawCampaign } from './drawCampaign.js';
import { epochWriter, LONGEST_WAIT_S, type LogRow } from './epochs.js';
import type { CampaignMark } from './marks.js';
import type { CampaignBase, CampaignOptions, CampaignSettings } from './options.js';
import { resolveOptions } from './resolveOptions.js';
import { SMALLEST_SPACING } from './schedule.js';
import { basesOf, occupationsOf, type SimulatedOccupation } from './simulateErrors.js';
import { type CampaignTruth, type RowCounts, truthOf } from './truth.js';

/** A simulated campaign as a receiver's log: rows in time order, and what they were made from. */
export interface SimulatedCampaign {
  readonly base: CampaignBase;
  /** The base, and the other one where there is one. */
  readonly bases: readonly CampaignBase[];
  readonly marks: readonly CampaignMark[];
  readonly rows: readonly LogRow[];
  /** The occupations behind the fixed rows, before rounding: the rows of `simulateErrors`. */
  readonly occupations: readonly SimulatedOccupation[];
  readonly truth: CampaignTruth;
}

/** A pause that ends a visit in common use, seconds. */
const PAUSE_S = 60;

/**
 * Simulates the log of a campaign: the occupations of `simulateErrors` with the same options, each as
 * epochs a second apart whose mean has the occupation's error up to rounding, with float rows, visits that
 * got no fix, mistyped marks and rows that stand twice.
 * Throws a `RangeError` for options that do not hold, also when visits would run into each other.
 */
export function simulateLog(options: CampaignOptions = {}): SimulatedCampaign {
  const settings = resolveOptions(options);
  checkSpacing(settings);
  const campaign = drawCampaign(settings);
  const rowsOf = epochWriter(settings, campaign.marks, randomStream(settings.seed, 'epochs'));
  const copying = randomStream(settings.seed, 'duplicates');
  const counts = { written: 0, fixed: 0, float: 0, unknownMark: 0, wrongMark: 0, duplicate: 0 };
  const rows: LogRow[] = [];
  for (const visit of campaign.visits)
    for (const row of rowsOf(visit)) {
      const kind = row.fix === 'float' ? 'float' : kindOf(visit);
      counts[kind]++;
      rows.push(row);
      if (kind === 'fixed' && copying() < settings.duplicateRowShare) {
        counts.duplicate++;
        rows.push(row);
      }
    }
  const written: RowCounts = { ...counts, written: rows.length };
  return {
    base: settings.base,
    bases: basesOf(settings),
    marks: campaign.marks,
    // The sort is stable, so a copy stays behind its row.
    rows: rows.sort((a, b) => a.timeMs - b.timeMs),
    occupations: occupationsOf(campaign),
    truth: truthOf(campaign, written),
  };
}

function kindOf({ outcome, blunder }: DrawnVisit): 'fixed' | 'unknownMark' | 'wrongMark' {
  if (outcome === 'unknown-mark') return 'unknownMark';
  return blunder?.kind === 'wrong-mark' ? 'wrongMark' : 'fixed';
}

/** Two visits of a rover at the same mark must stay two: the pause between them has to be long enough. */
function checkSpacing(settings: CampaignSettings): void {
  const { crews, workHours, epochsPerOccupation, habitual } = settings;
  const most = (habitual?.occupationsPerDay ?? settings.occupationsPerDay).to;
  const spacingS =
    ((workHours.to - workHours.from) * 3600 * SMALLEST_SPACING) / Math.ceil(most / crews.length);
  const neededS = PAUSE_S + LONGEST_WAIT_S + epochsPerOccupation + 1;
  if (spacingS >= neededS) return;
  const fit =
    Math.floor(((workHours.to - workHours.from) * 3600 * SMALLEST_SPACING) / neededS) * crews.length;
  refuse(
    'occupationsPerDay',
    `at most ${fit} a day for these crews, hours and epochs, so that visits stay apart`,
    most,
  );
}
