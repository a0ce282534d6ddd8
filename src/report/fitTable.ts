import type { FitResult } from '../study/index.js';
import type { Html } from './html.js';
import type { Page } from './page.js';
import { type Column, table } from './table.js';
import { componentTitle } from './words.js';

export const FORMULAS = {
  'root-sum-square': 'spread² = constant² + (ppm × distance)²',
  'linear-sum': 'spread = constant + ppm × distance',
} as const;

export const COUNTED_FROM = {
  absolute: 'published coordinates',
  repeatability: "the mark's other days",
  relative: "the setup's offset",
} as const;

/** Fits side by side. */
export function fitTable(
  page: Page,
  caption: string,
  fits: readonly FitResult[],
  more: readonly Column<FitResult>[] = [],
): Html {
  return table(caption, fits, [
    {
      head: 'Component',
      cell: ({ component }) => componentTitle(component, page.results.heights),
      text: true,
    },
    { head: 'Counted from', cell: ({ reference }) => COUNTED_FROM[reference], text: true },
    ...more,
    {
      head: `Constant, ${page.units.error.name}`,
      cell: ({ constantMm }) => page.limits(constantMm, 'error'),
    },
    { head: 'ppm', cell: (fit) => page.limits(fit.ppm, 'ppm') },
    { head: 'Spread is', cell: ({ basis }) => basis, text: true },
    { head: 'Occupations', cell: (fit) => page.number(fit, 'occupations', 'count') },
    { head: 'Days', cell: (fit) => page.number(fit, 'days', 'count') },
  ]);
}
