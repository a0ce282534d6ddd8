import { simulateErrors } from '../../src/campaign/index.js';
import type { ErrorByBaselineInput } from '../../src/charts/index.js';
import { type Component, fitErrorModel } from '../../src/fit/index.js';
import { maximumBaseline, type SpecSheet, type Tolerance } from '../../src/rule/index.js';
import { LENGTH_EDGES_KM, summarizeBy } from '../../src/split/index.js';

export const SPEC_SHEET: SpecSheet = {
  horizontal: { constantMm: 8, ppm: 1 },
  vertical: { constantMm: 15, ppm: 1 },
  form: 'linear-sum',
  axis: 'radial',
  level: 'rms',
};

export const tolerance = (component: Component, limitMm: number): Tolerance => ({
  component,
  limitMm,
  share: 0.95,
  dayShare: 0.9,
  confidence: 0.95,
});

/** About 200 occupations on 20 days. */
export const fewRows = () =>
  simulateErrors({ days: 20, occupationsPerDay: { from: 8, to: 12 }, seed: 3 }).rows;

/** About 1350 occupations on 30 days. */
export const manyRows = () => simulateErrors().rows;

/** Everything that the chart of errors can show. */
export function fullInput(rows: readonly object[], component: Component, limitMm: number) {
  const model = fitErrorModel(rows, { component });
  const limit = tolerance(component, limitMm);
  return {
    errors: rows,
    model,
    bins: summarizeBy(rows, { column: 'baselineKm', edges: LENGTH_EDGES_KM }),
    specSheet: SPEC_SHEET,
    tolerance: limit,
    rule: maximumBaseline(rows, model, limit),
  } satisfies ErrorByBaselineInput;
}

interface Layer {
  readonly data: { readonly values: readonly Readonly<Record<string, unknown>>[] };
  readonly mark: { readonly type: string; readonly [key: string]: unknown };
  readonly encoding: Readonly<Record<string, unknown>>;
}

/** The layers of a chart of one view. */
export const layersOf = (vegaLite: Record<string, unknown>): readonly Layer[] => vegaLite.layer as Layer[];

/** Data of the layers whose rows have all the given fields. */
export const rowsWith = (layers: readonly Layer[], ...fields: readonly string[]) =>
  layers
    .map(({ data }) => data.values)
    .filter((values) => values.length > 0 && fields.every((field) => field in values[0]!));
