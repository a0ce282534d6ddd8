import {
  associationChart,
  type ChartSpec,
  daysChart,
  hourDayChart,
  hourPpmChart,
  splitChart,
  wrongFixShareChart,
} from '../charts/index.js';
import { hourDayRatios } from '../days/index.js';
import { Page, splitsOf } from '../report/index.js';
import { flaggedByLength } from '../split/index.js';
import { SKY_OUTCOMES, type SkyAssociation, type StudyRun, skyPoints } from '../study/index.js';

/** A chart and the name of its file. */
export type NamedChart = readonly [name: string, chart: ChartSpec];

/** The days with what the sky did on them, as far as index files tell. */
export function dayCharts({ results }: StudyRun): NamedChart[] {
  const { dailyFactors, degradedDays, sky } = results;
  if (dailyFactors.length === 0) return [];
  const page = new Page(results);
  const explanations = degradedDays.map((one) =>
    one.verdict === 'one crew' && one.subject !== null
      ? { ...one, subject: page.crew(one.subject).replace(/^crew /, '') }
      : one,
  );
  return [['days', daysChart({ factors: dailyFactors, explanations, sky: sky?.days })]];
}

export const hourCharts = ({ results }: StudyRun): NamedChart[] =>
  results.timeOfDay
    .filter(({ hours }) => hours.some(({ ppm }) => ppm.estimate !== null))
    .map((timeOfDay): NamedChart => [`hours-${timeOfDay.component}`, hourPpmChart({ timeOfDay })]);

/** Errors by hour and day against the model, so that a bad afternoon shows which the thirds of a day average out. */
export const hourDayCharts = ({ models, errors, weights }: StudyRun): NamedChart[] =>
  models.flatMap((model): NamedChart[] => {
    const { component } = model;
    const cells = hourDayRatios(errors, model, { weights });
    return cells.length === 0 ? [] : [[`hours-and-days-${component}`, hourDayChart({ component, cells })]];
  });

/** Splits that have charts of their own, or too many groups for one. */
const OTHERWISE_DRAWN = ['baseline length, km', 'day', 'mark', 'setup of the base'];

/** Radial RMS by everything else that is known, where there are two classes or more to compare. */
export function splitCharts(run: StudyRun): NamedChart[] {
  const page = new Page(run.results);
  return splitsOf(run)
    .filter(({ title }) => !OTHERWISE_DRAWN.includes(title))
    .flatMap(({ title, rows }): NamedChart[] => {
      const named = rows.map((row) => (title === 'crew' ? { ...row, group: page.crew(row.group) } : row));
      const component = 'horizontal';
      const comparable = rows.filter(({ horizontalRms, tooFew }) => horizontalRms !== null && !tooFew);
      if (comparable.length < 2) return [];
      const name = `split-by-${title.replace(/,.*/, '').replaceAll(' ', '-').toLowerCase()}`;
      return [[name, splitChart({ rows: named, component, by: title })]];
    });
}

/** Of each outcome of the days the measure of the sky that goes with it most. */
export function skyCharts({ results: { sky, dailyFactors } }: StudyRun): NamedChart[] {
  if (sky === null) return [];
  return SKY_OUTCOMES.flatMap((outcome): NamedChart[] => {
    const first = sky.associations
      .filter((one) => one.outcome === outcome && one.spearman !== null)
      .reduce<SkyAssociation | null>(
        (a, b) => (a === null || (b.pValue ?? 1) < (a.pValue ?? 1) ? b : a),
        null,
      );
    if (first === null) return [];
    const points = skyPoints(sky.days, dailyFactors, outcome, first.measure);
    const chart = associationChart({ points, association: first, outcome, measure: first.measure });
    return [[`sky-${outcome.replaceAll(' ', '-')}`, chart]];
  });
}

export function wrongFixCharts({ wrongFixes, errors }: StudyRun): NamedChart[] {
  if (wrongFixes?.growth == null) return [];
  const { growth, screening } = wrongFixes;
  const classes = flaggedByLength(errors, screening.suspected);
  const longestKm = errors.reduce((most, { baselineKm }) => Math.max(most, baselineKm), 0);
  return [['wrong-fixes', wrongFixShareChart({ growth, classes, longestKm })]];
}
