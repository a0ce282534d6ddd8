import { type DrawnCampaign, drawCampaign } from './drawCampaign.js';
import type { CampaignMark } from './marks.js';
import type { CampaignBase, CampaignOptions, CampaignSettings } from './options.js';
import { resolveOptions } from './resolveOptions.js';
import { type CampaignTruth, truthOf } from './truth.js';

/** An occupation and its error, measured minus published, mm. */
export interface SimulatedOccupation {
  /** Local calendar day, `YYYY-MM-DD`. */
  readonly day: string;
  readonly base: string;
  readonly setup: string;
  readonly mark: string;
  readonly rover: string;
  readonly crew: string;
  /** First fixed position, UTC milliseconds. */
  readonly startMs: number;
  /** Mean solar time at the mark, hours. */
  readonly solarHour: number;
  readonly baselineKm: number;
  readonly azimuthDeg: number;
  /** Mark minus base, m. */
  readonly heightDifferenceM: number;
  readonly east: number;
  readonly north: number;
  readonly up: number;
  /** Whether wrong integers spoilt it: known here, never in the field. */
  readonly wrongFix: boolean;
  /** Whether the height of the rod was wrong. */
  readonly rodBlunder: boolean;
  /** The day's factor on the ppm, without the daily course. */
  readonly dayFactor: number;
}

/** A simulated campaign as errors: one row for every occupation with a fix on a known mark, in time order. */
export interface SimulatedErrors {
  readonly base: CampaignBase;
  /** The base, and the other one where there is one. */
  readonly bases: readonly CampaignBase[];
  readonly marks: readonly CampaignMark[];
  readonly rows: readonly SimulatedOccupation[];
  readonly truth: CampaignTruth;
}

/**
 * Simulates the errors of check shots straight away, without epochs or coordinates:
 * e = a z1 + b s_d h(t) L z2 per axis (`componentNoise` for z1, z2), plus the errors of mark and setup and
 * the vectors of wrong fixes. Throws a `RangeError` for options that do not hold (see `resolveOptions`).
 */
export function simulateErrors(options: CampaignOptions = {}): SimulatedErrors {
  const campaign = drawCampaign(resolveOptions(options));
  return {
    base: campaign.settings.base,
    bases: basesOf(campaign.settings),
    marks: campaign.marks,
    rows: occupationsOf(campaign),
    truth: truthOf(campaign, null),
  };
}

/** All bases of a campaign, without the days of the other one. */
export function basesOf({ base, otherBase }: CampaignSettings): CampaignBase[] {
  if (otherBase === null) return [base];
  const { fromDay, toDay, ...other } = otherBase;
  return [base, other];
}

/** The occupations that an analysis can use, in time order. */
export function occupationsOf(campaign: DrawnCampaign): SimulatedOccupation[] {
  return campaign.visits
    .filter((visit) => visit.outcome === 'fixed' && visit.blunder?.kind !== 'wrong-mark')
    .map((visit) => ({
      day: visit.day,
      base: visit.base,
      setup: visit.setup,
      mark: visit.mark.name,
      rover: visit.rover,
      crew: visit.crew,
      startMs: visit.startMs,
      solarHour: visit.solarHour,
      baselineKm: visit.mark.baselineKm,
      azimuthDeg: visit.mark.azimuthDeg,
      heightDifferenceM: visit.mark.heightDifferenceM,
      east: visit.error.east,
      north: visit.error.north,
      up: visit.error.up,
      wrongFix: visit.wrongFix !== null,
      rodBlunder: visit.blunder?.kind === 'rod-height',
      dayFactor: campaign.days[visit.dayIndex]!.factor,
    }));
}
