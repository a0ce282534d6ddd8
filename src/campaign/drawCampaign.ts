import { randomStream } from '../stats/index.js';
import { solarHour as solarHourAt } from '../time/index.js';
import { type Blunder, drawBlunders } from './blunders.js';
import { type CampaignDay, campaignDays } from './calendar.js';
import { refuse } from './checks.js';
import { hourFactor } from './hourFactor.js';
import { type CampaignMark, inventMarks, placeMark, seenFrom } from './marks.js';
import { correlatedNoise, tailFactors } from './noise.js';
import { drawOffsets } from './offsets.js';
import type { Axes, CampaignSettings, HabitualOptions } from './options.js';
import { type VisitOutcome, visitOutcomes } from './outcomes.js';
import { type BaseOnDuty, type PlannedVisit, planVisits } from './schedule.js';
import { wrongFixVectors } from './wrongFixes.js';

/** A visit with everything drawn for it. */
export interface DrawnVisit extends PlannedVisit {
  readonly outcome: VisitOutcome;
  /** Mean solar time at the mark, hours. */
  readonly solarHour: number;
  /** Measured minus published, mm, wrong integers included; without meaning where no fix was got. */
  readonly error: Axes;
  /** What wrong integers add, mm; null for a right fix. */
  readonly wrongFix: Axes | null;
  /** A mistake of the crew; null for none. */
  readonly blunder: Blunder | null;
}

/** A campaign before it is turned into rows. */
export interface DrawnCampaign {
  readonly settings: CampaignSettings;
  readonly days: readonly CampaignDay[];
  readonly marks: readonly CampaignMark[];
  readonly visits: readonly DrawnVisit[];
  /** Errors of the published coordinates by mark, offsets by setup, mm. */
  readonly markErrors: ReadonlyMap<string, Axes>;
  readonly setupErrors: ReadonlyMap<string, Axes>;
}

/**
 * Draws a campaign. Every part has a random stream of its own, so that switching one thing on leaves all
 * others as they were. Throws when habitual shots lack near or far marks.
 */
export function drawCampaign(settings: CampaignSettings): DrawnCampaign {
  const stream = (label: string) => randomStream(settings.seed, label);
  const days = campaignDays(settings, stream('day factors'));
  const marks = campaignMarks(settings);
  const planned = planVisits(settings, days, basesOnDuty(settings, marks), stream('schedule'));
  const outcomes = visitOutcomes(settings, planned, stream('outcomes'));
  const vectors =
    settings.wrongFixes === null
      ? new Map<number, Axes>()
      : wrongFixVectors(settings.wrongFixes, planned, stream('wrong fixes'));
  const blunders = drawBlunders(settings.blunders, planned, outcomes, marks, stream('blunders'));
  const markErrors = drawOffsets(
    marks.map((mark) => mark.name),
    settings.markSigmaMm,
    stream('mark errors'),
  );
  const setups = [...new Set(planned.map((visit) => visit.setup))];
  const setupErrors = drawOffsets(setups, settings.setupSigmaMm, stream('setup errors'));
  const solarHours = Float64Array.from(planned, (visit) =>
    solarHourAt(visit.startMs, visit.mark.longitudeDeg),
  );
  const growthKm = Float64Array.from(
    planned,
    (visit, i) =>
      days[visit.dayIndex]!.factor * hourFactor(settings.middayRise, solarHours[i]!) * visit.mark.baselineKm,
  );
  const noise = correlatedNoise(settings, planned, stream);
  const scale = tailFactors(settings.tailDegrees, planned.length, stream('tails'));
  const errorsOf = (axis: keyof Axes): Float64Array => {
    const { constant, distance } = noise[axis];
    const [constantMm, ppm] = [settings.constantMm[axis], settings.ppm[axis]];
    return Float64Array.from(
      planned,
      ({ mark, setup }, i) =>
        scale[i]! * (constantMm * constant[i]! + ppm * growthKm[i]! * distance[i]!) +
        markErrors.get(mark.name)![axis] +
        setupErrors.get(setup)![axis] +
        (vectors.get(i)?.[axis] ?? 0) +
        (axis === 'up' ? (blunders.get(i)?.upMm ?? 0) : 0),
    );
  };
  const [east, north, up] = [errorsOf('east'), errorsOf('north'), errorsOf('up')];
  const visits = planned.map(
    (visit, i): DrawnVisit => ({
      // Written out, not spread, which takes several times as long: coverage tests draw thousands of campaigns.
      dayIndex: visit.dayIndex,
      day: visit.day,
      crew: visit.crew,
      rover: visit.rover,
      base: visit.base,
      mark: visit.mark,
      setup: visit.setup,
      startMs: visit.startMs,
      outcome: outcomes[i]!,
      solarHour: solarHours[i]!,
      error: { east: east[i]!, north: north[i]!, up: up[i]! },
      wrongFix: vectors.get(i) ?? null,
      blunder: blunders.get(i) ?? null,
    }),
  );
  return { settings, days, marks, visits, markErrors, setupErrors };
}

/** The base of each day and the marks as seen from it. */
function basesOnDuty(
  { base, otherBase, habitual }: CampaignSettings,
  marks: readonly CampaignMark[],
): (dayIndex: number) => BaseOnDuty {
  const first = { base, marks };
  if (otherBase === null) return () => first;
  const other = { base: otherBase, marks: marks.map((mark) => seenFrom(otherBase, mark)) };
  if (habitual !== null) checkNearAndFar(other.marks, habitual);
  return (dayIndex) => (dayIndex + 1 >= otherBase.fromDay && dayIndex < otherBase.toDay ? other : first);
}

function campaignMarks(settings: CampaignSettings): CampaignMark[] {
  const { base, habitual } = settings;
  const plans =
    'length' in settings.marks
      ? settings.marks
      : inventMarks(base, settings.marks, randomStream(settings.seed, 'marks'));
  const marks = plans.map((plan) => placeMark(base, plan));
  if (habitual !== null) checkNearAndFar(marks, habitual);
  return marks;
}

function checkNearAndFar(marks: readonly CampaignMark[], { nearKm }: HabitualOptions): void {
  const near = marks.filter((mark) => mark.baselineKm <= nearKm).length;
  if (near === 0 || near === marks.length)
    refuse('habitual.nearKm', 'a distance with marks on either side', nearKm);
}
