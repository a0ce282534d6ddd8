import type { Form, Reference } from '../fit/index.js';
import type { StatedSetting } from './flatSettings.js';
import type { ReportUnits } from './readerUnits.js';
import { softwareVersion } from './softwareVersion.js';
import type { Study } from './study.js';

/** What made a result, and what the study file said. */
export interface StatedStudy {
  /** Version of the software. */
  readonly software: string;
  readonly study: {
    readonly title: string;
    readonly timeZone: string | null;
    readonly seed: number;
    readonly surveyor: string | null;
    readonly reportDate: string | null;
    readonly reportUnits: ReportUnits;
    readonly showCrews: boolean;
  };
  /** What the study file sets, defaults filled in, as far as numbers depend on it. */
  readonly settings: {
    readonly form: Form;
    readonly reference: Reference | 'auto';
    readonly confidence: number;
    readonly screen: boolean;
    readonly gapSeconds: number;
    readonly windowSeconds: number | null;
    readonly period: { readonly from: string; readonly to: string } | null;
    readonly leaveOutDays: readonly string[];
    /** 0 is not stated. */
    readonly centringSigmaMm: number;
    /** Every setting by its path in the study file, defaults filled in. */
    readonly stated: readonly StatedSetting[];
  };
}

/** What the study file says, as the results repeat it. */
export function statedStudy(study: Study): StatedStudy {
  const { title, timeZone, seed, surveyor, reportDate, reportUnits, showCrews } = study;
  const { form, reference, confidence, screen, gapSeconds, windowSeconds } = study;
  const { period, leaveOutDays, centringSigmaMm, stated } = study;
  return {
    software: softwareVersion(),
    study: { title, timeZone, seed, surveyor, reportDate, reportUnits, showCrews },
    settings: {
      form,
      reference,
      confidence,
      screen,
      gapSeconds,
      windowSeconds,
      period,
      leaveOutDays,
      centringSigmaMm,
      stated,
    },
  };
}
