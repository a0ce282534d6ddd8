import type { Control } from '../control/index.js';
import type { OccupationError, Visit } from '../errors/index.js';
import { baselineBetween } from '../geodesy/index.js';
import { type SpecSheet, specSheetSigmaMm } from '../rule/index.js';
import { LENGTH_EDGES_KM, summarizeBy } from '../split/index.js';
import type { LengthClass } from './results.js';
import type { Study } from './study.js';

/** Spread and visits without a fix by class of baseline length, nearest first. */
export function lengthClasses(
  errors: readonly OccupationError[],
  visits: readonly Visit[],
  control: Control,
  { confidence, specSheet }: Pick<Study, 'confidence' | 'specSheet'>,
): LengthClass[] {
  const summaries = summarizeBy(errors, { column: 'baselineKm', edges: LENGTH_EDGES_KM }, { confidence });
  const withoutFix = visits
    .filter(({ fixedRows }) => fixedRows === 0)
    .map(({ mark, base }) => lengthKm(control, mark, base));
  return LENGTH_EDGES_KM.slice(1).flatMap((toKm, k): LengthClass[] => {
    const fromKm = LENGTH_EDGES_KM[k]!;
    const visitsWithoutFix = withoutFix.filter((km) => km >= fromKm && km < toKm).length;
    const summary = summaries.find(({ from }) => from === fromKm);
    if (summary === undefined && visitsWithoutFix === 0) return [];
    return [
      {
        fromKm,
        toKm,
        baselineKm: summary?.baselineKm ?? (fromKm + toKm) / 2,
        occupations: summary?.occupations ?? 0,
        days: summary?.days ?? 0,
        visitsWithoutFix,
        horizontalRmsMm: summary?.horizontalRms ?? null,
        verticalRmsMm: summary?.verticalRms ?? null,
        specSheetMm:
          specSheet === null ? null : stated(specSheet, summary?.baselineKm ?? (fromKm + toKm) / 2),
        tooFew: summary?.tooFew ?? true,
      },
    ];
  });
}

const stated = (sheet: SpecSheet, km: number): { horizontal: number; vertical: number } => ({
  horizontal: specSheetSigmaMm(sheet, 'horizontal', km),
  vertical: specSheetSigmaMm(sheet, 'vertical', km),
});

/** NaN for a mark whose plan position is not known. */
function lengthKm(control: Control, mark: string, base: string): number {
  const { position } = control.marks.get(mark)!;
  const from = control.bases.get(base)!.position;
  const heightM = Number.isNaN(position.heightM) ? from.heightM : position.heightM;
  return Number.isNaN(position.latitudeDeg)
    ? Number.NaN
    : baselineBetween(from, { ...position, heightM }).lengthKm;
}
