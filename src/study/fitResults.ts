import type { OccupationError } from '../errors/index.js';
import { type ErrorModel, fitWithoutEachDay, setupOffsets, wrongFixShareAtKm } from '../fit/index.js';
import { markMeans } from '../split/index.js';
import type { ComponentFits, FittedModel } from './fitComponents.js';
import type { FitResult, MarkComponentResult, MarkResult } from './fitResultTypes.js';
import { type JudgedDays, ppmInterval } from './judgeDays.js';
import type { Results } from './results.js';
import type { WrongFixes } from './screenStudy.js';

/** Distances at which the share of wrong fixes is told, as far as the data reach, km. */
const TOLD_AT_KM = [1, 2, 5, 10, 20, 30];

/** The fits of all components as the results state them. */
export function fitResults(
  components: readonly ComponentFits[],
  errors: readonly OccupationError[],
  wrongFixes: WrongFixes | null,
  judged: readonly JudgedDays[],
): Pick<Results, 'fits' | 'comparison' | 'setups' | 'markComponents'> {
  return {
    fits: components.flatMap(({ component, fits, basis }) => {
      const days = judged.find((each) => each.component === component);
      return fits.map((fitted) => fitResult(fitted, basis, errors, wrongFixes, days));
    }),
    comparison: components.map(({ comparison: { component, against, gain, se, days, verdict } }) => ({
      component: component as FitResult['component'],
      against,
      gain,
      se,
      days,
      verdict,
    })),
    setups: setupResults(errors, wrongFixes),
    markComponents: components.flatMap(markComponentResult),
  };
}

/** Offsets of the setups, where the errors tell which setup they are from. */
function setupResults(errors: readonly OccupationError[], wrongFixes: WrongFixes | null): Results['setups'] {
  if (errors.length === 0) return [];
  return setupOffsets(errors, { weights: wrongFixes?.weights ?? undefined }).setups;
}

function markComponentResult({ component, markComponent, markTest }: ComponentFits): MarkComponentResult[] {
  if (markComponent === null) return [];
  return [
    {
      component,
      marks: markComponent.marksUsed,
      standing: markComponent.standing,
      sigmaMm: markComponent.sigmaMm,
      signedPpm: markComponent.trend,
      differPValue: markTest?.differ?.pValue ?? null,
      anyPValue: markTest?.any?.pValue ?? null,
      spreadMm: markTest?.spreadMm ?? null,
      standOut: (markTest?.beyondThreeErrors ?? []).map(({ mark }) => mark),
    },
  ];
}

/** The mean error of each mark, and whether it stands out. A mark on the base has no direction: 0 leaves it in the middle of a map. */
export function markResults(
  used: readonly OccupationError[],
  components: readonly ComponentFits[],
): MarkResult[] {
  const out = (component: FitResult['component'], mark: string): boolean =>
    components
      .find((each) => each.component === component)
      ?.markTest?.beyondThreeErrors.some((each) => each.mark === mark) ?? false;
  return markMeans(used).map((mean) => ({
    ...mean,
    azimuthDeg: Number.isNaN(mean.azimuthDeg) ? 0 : mean.azimuthDeg,
    standsOut: { horizontal: out('horizontal', mean.mark), vertical: out('vertical', mean.mark) },
  }));
}

/** A model as the results state it. */
function fitResult(
  { model, composed }: FittedModel,
  basis: ErrorModel,
  errors: readonly OccupationError[],
  wrongFixes: WrongFixes | null,
  days: JudgedDays | undefined,
): FitResult {
  const { component, reference, form, screened, confidence, constantMm, ppmIfIndependent } = model;
  const { informationNumber, occupations, marks, shortestKm, longestKm, notes } = model;
  const isBasis = model === basis;
  // A composed fit has the ppm of the basis, and so its interval.
  const likeBasis = isBasis || (composed && sameButReference(model, basis));
  const { ppm, interval } = ppmInterval(model, likeBasis ? days : undefined);
  return {
    component,
    reference,
    composed,
    form,
    screened,
    basisOfRule: isBasis,
    basis: model.basis,
    confidence,
    constantMm,
    ppm,
    ppmIfIndependent,
    interval,
    medianDayPpm: isBasis && days?.model.posterior ? days.model.medianDayPpm : null,
    wrongFixShare: screened && wrongFixes !== null ? wrongFixShare(wrongFixes, longestKm) : null,
    signedPpm: model.markComponent?.trend ?? null,
    informationNumber,
    occupations,
    days: model.days,
    marks,
    shortestKm,
    longestKm,
    mostInfluentialDay: isBasis ? mostInfluentialDay(model, errors, wrongFixes) : null,
    notes: notes.map(({ text }) => text),
  };
}

const sameButReference = (a: ErrorModel, b: ErrorModel): boolean =>
  b.reference === 'repeatability' && a.form === b.form && a.screened === b.screened;

function wrongFixShare({ screening, growth }: WrongFixes, longestKm: number): FitResult['wrongFixShare'] {
  const { share } = screening;
  if (share === null) return null;
  const { events, estimate, low, high } = share;
  const atKm =
    growth === null
      ? []
      : TOLD_AT_KM.filter((km) => km <= longestKm).map((km) => {
          const at = wrongFixShareAtKm(growth, km);
          return { baselineKm: km, estimate: at.mean, high: at.high95 };
        });
  return { events, estimate, low, high, atKm };
}

function mostInfluentialDay(
  { component, form, reference, uncertainty, ppm }: ErrorModel,
  errors: readonly OccupationError[],
  wrongFixes: WrongFixes | null,
): FitResult['mostInfluentialDay'] {
  if (uncertainty === null || ppm.estimate === null) return null;
  let most: FitResult['mostInfluentialDay'] = null;
  const change = (without: number): number => Math.abs(without - ppm.estimate!);
  const weights = wrongFixes?.weights ?? undefined;
  for (const { day, ppm: without } of fitWithoutEachDay(errors, { component, form, reference, weights })) {
    if (without !== null && (most === null || change(without) > change(most.ppmWithout))) {
      most = { day, ppmWithout: without };
    }
  }
  return most;
}
