import { type SpecSheet, specSheetSigmaMm } from '../rule/index.js';
import type { FitResult, LengthClass, Results } from '../study/index.js';
import { count, mm, NOT_GIVEN, percent, ppm, withLimits } from './format.js';
import { type Html, html } from './html.js';
import { type Column, table } from './table.js';
import { componentTitle, type HeightKind, REFERENCE_WORDS, shownFits } from './words.js';

/** How the errors grow with distance: charts, fitted models and what was measured by length. */
export function fitSection(
  results: Results,
  charts: { readonly horizontal: Html | null; readonly vertical: Html | null },
): Html {
  const { fits, lengthClasses, specSheet, heights } = results;
  if (fits.length === 0)
    return html`<section id="fit"><h2>How errors grow with distance</h2><p>No fit was possible.</p></section>\n`;
  return html`<section id="fit"><h2>How errors grow with distance</h2>
${charts.horizontal}${charts.vertical}${manyTolerances(results)}
${fitTable(shownFits(results), heights)}
${shownFits(results).map((fit) => fitRemarks(fit, heights))}
${lengthTable(lengthClasses, specSheet, heights)}
</section>
`;
}

const FORMULAS = {
  'root-sum-square': 'spread² = constant² + (ppm × distance)²',
  'linear-sum': 'spread = constant + ppm × distance',
} as const;

const COUNTED_FROM = {
  absolute: 'published coordinates',
  repeatability: "the mark's other days",
  relative: "the setup's offset",
} as const;

function fitTable(fits: readonly FitResult[], heights: HeightKind): Html {
  const level = percent(fits[0]!.confidence);
  const columns: Column<FitResult>[] = [
    { head: 'Component', cell: ({ component }) => componentTitle(component, heights), text: true },
    { head: 'Counted from', cell: ({ reference }) => COUNTED_FROM[reference], text: true },
    { head: 'Constant, mm', cell: ({ constantMm }) => withLimits(constantMm, mm) },
    { head: 'ppm, mm per km', cell: (fit) => withLimits(fit.ppm, ppm) },
    { head: 'Spread is', cell: ({ basis }) => basis, text: true },
    { head: 'Occupations', cell: ({ occupations }) => count(occupations) },
    { head: 'Days', cell: ({ days }) => count(days) },
  ];
  return table(
    `Own error model, ${[...new Set(fits.map(({ form }) => FORMULAS[form]))].join(' or ')}, with ${level} intervals`,
    fits,
    columns,
  );
}

function fitRemarks(fit: FitResult, heights: HeightKind): Html {
  const { low, high } = fit.ppmIfIndependent;
  const independent =
    low === null || high === null
      ? null
      : html` If every shot were independent the ppm would seem to lie between ${ppm(low)} and ${ppm(high)}: shots of one day are alike, so days are counted instead.`;
  const influential =
    fit.mostInfluentialDay === null
      ? null
      : html` The day that moves the ppm most is ${fit.mostInfluentialDay.day}: without it the ppm is ${ppm(fit.mostInfluentialDay.ppmWithout)}.`;
  return html`<p class="small">${componentTitle(fit.component, heights)}: ${REFERENCE_WORDS[fit.reference]}; interval by ${fit.interval}.${independent}${influential}</p>
`;
}

function lengthTable(classes: readonly LengthClass[], spec: SpecSheet | null, heights: HeightKind): Html {
  const rms = (interval: LengthClass['horizontalRmsMm']): string =>
    interval === null ? NOT_GIVEN : withLimits(interval, mm);
  const columns: Column<LengthClass>[] = [
    { head: 'Distance, km', cell: ({ fromKm, toKm }) => `${fromKm} to ${toKm}`, text: true },
    { head: 'Occupations', cell: ({ occupations }) => count(occupations) },
    { head: 'Days', cell: ({ days }) => count(days) },
    { head: 'Visits without a fix', cell: ({ visitsWithoutFix }) => count(visitsWithoutFix) },
    { head: 'Radial RMS, mm', cell: ({ horizontalRmsMm, tooFew }) => mark(rms(horizontalRmsMm), tooFew) },
    { head: 'Vertical RMS, mm', cell: ({ verticalRmsMm, tooFew }) => mark(rms(verticalRmsMm), tooFew) },
  ];
  if (spec !== null) {
    const stated =
      (component: 'horizontal' | 'vertical') =>
      ({ baselineKm }: LengthClass): string =>
        mm(specSheetSigmaMm(spec, component, baselineKm));
    columns.push(
      { head: 'Spec sheet, radial', cell: stated('horizontal') },
      { head: 'Spec sheet, vertical', cell: stated('vertical') },
    );
  }
  const starred = classes.some(({ tooFew, occupations }) => tooFew && occupations > 0);
  const notes = [
    ...(starred
      ? [
          '* too few: fewer than 10 occupations or 3 days; the figure describes these occupations and nothing more.',
        ]
      : []),
    ...(spec === null
      ? []
      : ['The spec sheet is for ideal conditions, converted to the same kind of spread.']),
  ];
  return html`${table(`Measured by distance (shown, not fitted); vertical: ${heights} heights`, classes, columns)}
<p class="small">${notes.join(' ')}</p>
`;
}

const mark = (text: string, tooFew: boolean): string => (tooFew && text !== NOT_GIVEN ? `${text} *` : text);

/** A chart shows one tolerance; where a component has more, this says which. */
function manyTolerances({ rules }: Results): Html | null {
  const several = rules.some(
    ({ component }, k) => rules.findIndex((rule) => rule.component === component) !== k,
  );
  if (!several) return null;
  return html`<p class="small">Each chart shows the first tolerance of its component; the others stand in the list of rules above.</p>\n`;
}
