import type { ControlFile } from '../control/index.js';
import type { Form, Reference, Term } from '../fit/index.js';
import type { LogFile, Message } from '../logs/index.js';
import type { SpecSheet, Tolerance } from '../rule/index.js';
import type { HeightKind } from './coordinateChanges.js';
import type { NamedFile } from './fileFinder.js';
import type { StatedSetting } from './flatSettings.js';
import type { ReportUnits } from './readerUnits.js';
import type { FieldTestSettings, StandardName } from './ruleSettings.js';

/** A file of job points. */
export interface JobFile extends ControlFile {
  /** Horizontal limit of the job, mm; null where the tolerances of the study hold. */
  readonly limitMm: number | null;
}

/** A study ready to run: settings with every default filled in, files found. */
export interface Study {
  /** Absolute path of the study file and of its folder. */
  readonly file: string;
  readonly folder: string;
  readonly title: string;
  /** Who answers for the report, and its day. */
  readonly surveyor: string | null;
  readonly reportDate: string | null;
  /** Units of pages and charts. */
  readonly reportUnits: ReportUnits;
  /** Name crews on pages instead of numbering them. */
  readonly showCrews: boolean;
  readonly timeZone: string | null;
  /** Kind of heights that are compared: that of the marks. */
  readonly heightKind: HeightKind;
  readonly marks: ControlFile;
  readonly bases: ControlFile;
  /** Marks to which a job was fitted: their errors are residuals, not checks. */
  readonly siteMarks: readonly string[];
  /** Frames that logs state; without any their frame is that of the base. */
  readonly logFrames: readonly {
    readonly frame: string;
    readonly epoch: number;
    readonly transformed: boolean;
  }[];
  /** Marks, bases or all logs are brought to one frame. */
  readonly broughtToOneFrame: boolean;
  /** One geoid separation leads from one kind of height to the other. */
  readonly constantSeparation: boolean;
  /** How logs name marks. */
  readonly namePattern: RegExp | null;
  readonly aliases: NamedFile | null;
  /** Log → list of stays on marks. */
  readonly markTimes: ReadonlyMap<string, NamedFile>;
  readonly logs: readonly LogFile[];
  /** What is to be told of the layouts that were recognised. */
  readonly messages: readonly Message[];
  readonly period: { readonly from: string; readonly to: string } | null;
  readonly gapSeconds: number;
  readonly windowSeconds: number | null;
  /** Form and reference of the fit behind the rules. */
  readonly form: Form;
  readonly reference: Reference | 'auto';
  /** Level of the two-sided intervals. */
  readonly confidence: number;
  /** Look for wrong fixes and let them count less. */
  readonly screen: boolean;
  readonly tolerances: readonly Tolerance[];
  readonly specSheet: SpecSheet | null;
  /** Site minus base, m, of the site that vertical rules are for; null without one. */
  readonly siteHeightDifferenceM: number | null;
  /** How often limits of check shots may alarm for nothing. */
  readonly checkShots: { readonly falseAlarmsPerYear: number; readonly checksPerYear: number };
  readonly jobs: readonly JobFile[];
  readonly standards: readonly StandardName[];
  readonly fieldTests: readonly FieldTestSettings[];
  /** Standard deviation of centring the rod, one axis, mm. */
  readonly centringSigmaMm: number;
  readonly terms: readonly Term[];
  readonly by: readonly ('crew' | 'rover' | 'base')[];
  /** Files of geomagnetic indices, and of ionosphere maps. */
  readonly indices: readonly NamedFile[];
  readonly maps: readonly NamedFile[];
  /** Grids of geoid separations. */
  readonly geoidGrids: readonly NamedFile[];
  readonly leaveOutDays: readonly string[];
  readonly seed: number;
  /** Every setting by its path in the study file, defaults filled in. */
  readonly stated: readonly StatedSetting[];
}
