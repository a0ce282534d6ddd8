import type { CommonCauses, StaticShots } from '../errors/index.js';
import type { GroupComparison, SetupOffsets } from '../fit/index.js';
import type { LogResolution, Message, OccupationReason, ReasonCount, RowReason } from '../logs/index.js';
import type {
  CheckShotLimits,
  OccupationLengthRow,
  PositionPromise,
  Rule,
  RuleTableRow,
  SpecSheet,
  SpecSheetTest,
  StandardResult,
} from '../rule/index.js';
import type { Interval } from '../split/index.js';
import type { ControlMark } from './controlMarks.js';
import type {
  DailyFactorResult,
  DayModelResult,
  DegradedDayResult,
  LeftOutDays,
  TimeOfDayResult,
} from './dayResultTypes.js';
import type { EvidenceResult, TermsResult } from './evidenceResultTypes.js';
import type {
  ComparisonResult,
  FitResult,
  MarkComponentResult,
  MarkResult,
  WrongFixResult,
} from './fitResultTypes.js';
import type { HoursOfCaution, ShotHours } from './hoursOfCaution.js';
import type { InputFile } from './inputFiles.js';
import type { RuleOutcomes } from './ruleOutcomes.js';
import type {
  BackTestResult,
  HourRule,
  JobResult,
  SeasonRule,
  SecondVisitsResult,
  WatchResult,
} from './ruleResultTypes.js';
import type { Sky } from './skyResult.js';
import type { StatedStudy } from './statedStudy.js';

/** Measured spread by class of baseline length. Shown, never fitted. */
export interface LengthClass {
  readonly fromKm: number;
  readonly toKm: number;
  readonly baselineKm: number;
  readonly occupations: number;
  readonly days: number;
  readonly visitsWithoutFix: number;
  readonly horizontalRmsMm: Interval | null;
  readonly verticalRmsMm: Interval | null;
  /** What the spec sheet states at `baselineKm`, as radial RMS and vertical RMS; null without one. */
  readonly specSheetMm: { readonly horizontal: number; readonly vertical: number } | null;
  readonly tooFew: boolean;
}

/** The account of one log file. */
export interface FileResult {
  readonly file: string;
  /** SHA-256 of its bytes. */
  readonly sha256: string;
  /** Steps in which its positions are written, mm; null when nothing could be read. */
  readonly resolution: LogResolution | null;
  readonly read: number;
  readonly used: number;
  readonly setAside: Readonly<Partial<Record<RowReason, ReasonCount>>>;
}

/** An occupation that a person likely got wrong. */
export interface BlunderResult {
  readonly mark: string;
  readonly day: string;
  readonly crew: string;
  readonly rover: string;
  readonly cause: string;
  readonly file: string;
  readonly row: number;
}

/** Everything a run found: the value from which every output is written. `results.json` is this, in JSON. */
export interface Results extends StatedStudy, RuleOutcomes {
  readonly version: 1;
  readonly messages: readonly Message[];
  readonly rows: {
    readonly read: number;
    readonly used: number;
    readonly setAside: Readonly<Partial<Record<RowReason, number>>>;
  };
  readonly files: readonly FileResult[];
  /** What was read beside the logs. */
  readonly inputs: readonly InputFile[];
  /** What rounding of the coarsest log adds to the constant, mm: radial, and vertical; null without positions. */
  readonly roundingMm: { readonly horizontal: number; readonly vertical: number } | null;
  /** Static occupations cut into shots, and about how many of these are independent; null without windowSeconds. */
  readonly staticShots: StaticShots | null;
  readonly visits: { readonly withFix: number; readonly withoutFix: number };
  readonly occupations: {
    readonly formed: number;
    readonly used: number;
    readonly setAside: Readonly<Partial<Record<OccupationReason, number>>>;
  };
  /** Kind of heights that were compared, and so of every vertical error. */
  readonly heights: 'ellipsoidal' | 'orthometric';
  /** What the marks of each base have in common, and what likely caused it. Signed: no part of the scatter. */
  readonly commonCauses: CommonCauses;
  /** Occupations taken for blunders, which are among those set aside. */
  readonly blunders: readonly BlunderResult[];
  /** Where the coordinates behind the errors come from. */
  readonly controlMarks: readonly ControlMark[];
  /** Marks to which a job was fitted: their errors are residuals, not checks. */
  readonly siteMarks: readonly string[];
  /** Days with at least one used occupation. */
  readonly days: number;
  readonly period: { readonly from: string; readonly to: string } | null;
  readonly bases: readonly string[];
  /** As the logs name them; pages number crews unless the study shows them. */
  readonly crews: readonly string[];
  readonly rovers: readonly string[];
  readonly fits: readonly FitResult[];
  readonly comparison: readonly ComparisonResult[];
  readonly setups: readonly SetupOffsets[];
  readonly markComponents: readonly MarkComponentResult[];
  /** Occupations that look like wrong fixes, for review. */
  readonly wrongFixes: readonly WrongFixResult[];
  readonly terms: readonly TermsResult[];
  readonly groups: readonly Omit<GroupComparison, 'message'>[];
  readonly evidence: readonly EvidenceResult[];
  readonly dayModels: readonly DayModelResult[];
  readonly dailyFactors: readonly DailyFactorResult[];
  readonly degradedDays: readonly DegradedDayResult[];
  readonly timeOfDay: readonly TimeOfDayResult[];
  /** Hours at which errors are shown to be larger. */
  readonly hoursOfCaution: readonly HoursOfCaution[];
  /** Between which hours the shots were taken; null where no time of day is known. */
  readonly shotHours: ShotHours | null;
  readonly lengthClasses: readonly LengthClass[];
  readonly marks: readonly MarkResult[];
  /** The sky of the days and what goes with it; null without files that tell of it. */
  readonly sky: Sky | null;
  readonly rules: readonly Rule[];
  readonly ruleTable: readonly RuleTableRow[];
  /** What can be promised at some lengths, on 90 % of the days. */
  readonly promises: readonly PositionPromise[];
  readonly rulesByHour: readonly HourRule[];
  readonly rulesBySeason: readonly SeasonRule[];
  readonly backTest: readonly BackTestResult[];
  readonly specSheetTest: readonly SpecSheetTest[];
  readonly checkShotLimits: readonly CheckShotLimits[];
  readonly watch: readonly WatchResult[];
  readonly jobs: readonly JobResult[];
  readonly standards: readonly StandardResult[];
  readonly secondVisits: readonly SecondVisitsResult[];
  readonly errorByOccupationLength: readonly OccupationLengthRow[];
  /** The days left out by the study file, and the results with them; null where none is. */
  readonly leftOut: LeftOutDays | null;
  /** The spec sheet as stated. */
  readonly specSheet: SpecSheet | null;
}
