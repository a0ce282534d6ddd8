import type { Blunder } from './blunders.js';
import { type ComponentTruth, componentTruths } from './componentTruth.js';
import type { DrawnCampaign, DrawnVisit } from './drawCampaign.js';
import type { Axes, CampaignSettings } from './options.js';
import { mistypedName } from './outcomes.js';

/** A visit that something was done to. */
export interface InjectedVisit {
  readonly day: string;
  readonly mark: string;
  readonly rover: string;
  readonly startMs: number;
  readonly baselineKm: number;
}

/** How many rows of each kind a log holds; `written` is the sum of the five others. */
export interface RowCounts {
  readonly written: number;
  /** Fixed, on a known mark, counted once. */
  readonly fixed: number;
  /** Float: before a fix, and in visits that never got one. */
  readonly float: number;
  readonly unknownMark: number;
  /** Fixed, under the name of another mark. */
  readonly wrongMark: number;
  /** Second copies. */
  readonly duplicate: number;
}

/** What a campaign was made from, to compare with what an analysis finds. */
export interface CampaignTruth {
  readonly settings: CampaignSettings;
  readonly components: {
    readonly east: ComponentTruth;
    readonly north: ComponentTruth;
    readonly up: ComponentTruth;
    /** Radial: root of the sum of the squares of east and north. */
    readonly horizontal: ComponentTruth;
    /** The same as `up`. */
    readonly vertical: ComponentTruth;
  };
  /** Days in order; `factor` multiplies the ppm, `bad` days belong to a run of bad days. */
  readonly days: readonly { readonly day: string; readonly factor: number; readonly bad: boolean }[];
  /** Errors of the published coordinates, mm; they show as errors of all shots on the mark. */
  readonly marks: readonly (Axes & { readonly mark: string; readonly baselineKm: number })[];
  /** Offsets common to all shots of a setup, mm. */
  readonly setups: readonly (Axes & { readonly setup: string })[];
  readonly visits: {
    readonly planned: number;
    readonly withFix: number;
    readonly withoutFix: number;
    readonly unknownMark: number;
    readonly wrongMark: number;
  };
  readonly visitsWithoutFix: readonly InjectedVisit[];
  readonly unknownMarks: readonly (InjectedVisit & { readonly writtenAs: string })[];
  /** Wrong fixes among the occupations with a fix on a known mark; east, north, up: the vector added, mm. */
  readonly wrongFixes: readonly (InjectedVisit & Axes)[];
  /** Mistakes of people; `upMm` is what a wrong height of the rod adds, `writtenAs` the mark's name in the log. */
  readonly blunders: readonly (InjectedVisit & Blunder)[];
  /** Null where errors alone were simulated. */
  readonly rows: RowCounts | null;
}

/** The truth of a drawn campaign; `rows` as counted when its log was written. */
export function truthOf(campaign: DrawnCampaign, rows: RowCounts | null): CampaignTruth {
  const { settings, days, marks, visits, markErrors, setupErrors } = campaign;
  const withOutcome = (outcome: DrawnVisit['outcome']) => visits.filter((visit) => visit.outcome === outcome);
  const known = withOutcome('fixed');
  const wrongMark = known.filter(({ blunder }) => blunder?.kind === 'wrong-mark');
  const fixed = known.filter((visit) => !wrongMark.includes(visit));
  const withoutFix = withOutcome('no-fix');
  const unknown = withOutcome('unknown-mark');
  return {
    settings,
    components: componentTruths(campaign),
    days: days.map(({ day, factor, bad }) => ({ day, factor, bad })),
    marks: marks.map(({ name, baselineKm }) => ({ mark: name, baselineKm, ...markErrors.get(name)! })),
    setups: [...setupErrors].map(([setup, error]) => ({ setup, ...error })),
    visits: {
      planned: visits.length,
      withFix: fixed.length,
      withoutFix: withoutFix.length,
      unknownMark: unknown.length,
      wrongMark: wrongMark.length,
    },
    visitsWithoutFix: withoutFix.map(injected),
    unknownMarks: unknown.map((visit) => ({
      ...injected(visit),
      writtenAs: mistypedName(visit.mark.name, marks),
    })),
    wrongFixes: fixed.flatMap((visit) =>
      visit.wrongFix === null ? [] : [{ ...injected(visit), ...visit.wrongFix }],
    ),
    blunders: known.flatMap((visit) =>
      visit.blunder === null ? [] : [{ ...injected(visit), ...visit.blunder }],
    ),
    rows,
  };
}

const injected = ({ day, mark, rover, startMs }: DrawnVisit): InjectedVisit => ({
  day,
  mark: mark.name,
  rover,
  startMs,
  baselineKm: mark.baselineKm,
});
