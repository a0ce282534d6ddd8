import { geocentricToGeodetic, type LocalFrame, localFrame } from '../geodesy/index.js';
import { normalDeviates, type Random } from '../stats/index.js';
import { wholeBetween } from './draw.js';
import type { DrawnVisit } from './drawCampaign.js';
import type { CampaignMark } from './marks.js';
import type { Axes, CampaignSettings } from './options.js';
import { mistypedName } from './outcomes.js';
import { roundTo } from './rounding.js';

/** One row of a simulated log, a position as the receiver wrote it down. */
export interface LogRow {
  /** UTC milliseconds. */
  readonly timeMs: number;
  readonly base: string;
  readonly setup: string;
  /** As written in the log, which may be mistyped. */
  readonly mark: string;
  readonly rover: string;
  readonly crew: string;
  /** WGS 84, rounded to 1e-9 degrees and 0.1 mm. */
  readonly latitudeDeg: number;
  readonly longitudeDeg: number;
  readonly heightM: number;
  readonly fix: 'fixed' | 'float';
  readonly satellites: number;
  readonly pdop: number;
  /** Age of the corrections, seconds. */
  readonly ageSeconds: number;
}

/** No visit waits longer for its fix, seconds; together with the epochs it bounds a visit's length. */
export const LONGEST_WAIT_S = 20;
/** Scatter of float positions per axis, mm. */
const FLOAT_SIGMA_MM: Axes = { east: 300, north: 300, up: 600 };

/** Turns visits into rows. The receiver's figures of merit (satellites, pdop, age) say nothing about the error. */
export function epochWriter(
  settings: CampaignSettings,
  marks: readonly CampaignMark[],
  random: Random,
): (visit: DrawnVisit) => LogRow[] {
  const normal = normalDeviates(random);
  const frames = new Map(marks.map((mark) => [mark.name, localFrame(mark)]));
  const epochs = settings.epochsPerOccupation;
  return (visit) => {
    const frame = frames.get(visit.mark.name)!;
    const satellites = wholeBetween(random, 11, 24);
    const row = (second: number, offset: Axes, fix: LogRow['fix']): LogRow => ({
      timeMs: visit.startMs + 1000 * second,
      base: visit.base,
      setup: visit.setup,
      mark: writtenName(visit, marks),
      rover: visit.rover,
      crew: visit.crew,
      ...written(frame, offset),
      fix,
      satellites,
      pdop: roundTo(0.7 + 14 / satellites + 0.1 * random(), 1),
      ageSeconds: roundTo(1 + 1.5 * random(), 1),
    });
    const float = (second: number) => row(second, scatter(FLOAT_SIGMA_MM, normal), 'float');
    if (visit.outcome === 'no-fix') return seconds(0, epochs).map(float);
    const wait = visit.outcome === 'fixed' ? waitSeconds(settings, random) : 0;
    const noise = centred(seconds(0, epochs).map(() => scatter(settings.epochSigmaMm, normal)));
    return [
      ...seconds(-wait, wait).map(float),
      ...noise.map((offset, i) => row(i, added(visit.error, offset), 'fixed')),
    ];
  };
}

/** The mark's name as it stands in the log. */
export function writtenName(
  { outcome, mark, blunder }: DrawnVisit,
  marks: readonly Pick<CampaignMark, 'name'>[],
): string {
  return outcome === 'unknown-mark' ? mistypedName(mark.name, marks) : (blunder?.writtenAs ?? mark.name);
}

const seconds = (first: number, count: number): number[] =>
  Array.from({ length: count }, (_, i) => first + i);

const added = (a: Axes, b: Axes): Axes => ({
  east: a.east + b.east,
  north: a.north + b.north,
  up: a.up + b.up,
});

const scatter = (sigma: Axes, normal: () => number): Axes => ({
  east: sigma.east * normal(),
  north: sigma.north * normal(),
  up: sigma.up * normal(),
});

/** Float rows before a fix: geometric, so that they are `floatRowShare` of the rows, cut at the longest wait. */
function waitSeconds(settings: CampaignSettings, random: Random): number {
  const { floatRowShare, epochsPerOccupation } = settings;
  const u = random();
  if (floatRowShare === 0) return 0;
  const mean = (floatRowShare / (1 - floatRowShare)) * epochsPerOccupation;
  return Math.min(LONGEST_WAIT_S, Math.floor(Math.log(1 - u) / Math.log(mean / (1 + mean))));
}

/** The offsets less their mean, so that the occupation's mean error stays as simulated. */
function centred(offsets: readonly Axes[]): Axes[] {
  const total = offsets.reduce(added, { east: 0, north: 0, up: 0 });
  const n = offsets.length;
  return offsets.map((offset) => ({
    east: offset.east - total.east / n,
    north: offset.north - total.north / n,
    up: offset.up - total.up / n,
  }));
}

/** Where a position with this error (mm) lies, with the decimals of a log. */
function written(frame: LocalFrame, { east, north, up }: Axes) {
  const position = geocentricToGeodetic(
    frame.toGeocentric({ eastM: east / 1000, northM: north / 1000, upM: up / 1000 }),
  );
  return {
    latitudeDeg: roundTo(position.latitudeDeg, 9),
    longitudeDeg: roundTo(position.longitudeDeg, 9),
    heightM: roundTo(position.heightM, 4),
  };
}
