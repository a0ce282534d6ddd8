import {
  backTestChart,
  type ChartSpec,
  chartInUnits,
  errorByBaselineChart,
  jobMapChart,
  markMapChart,
  markMeansChart,
  renderSvg,
  ruleMovesChart,
} from '../charts/index.js';
import type { OccupationError } from '../errors/index.js';
import { type Component, type ErrorModel, referenceData } from '../fit/index.js';
import { changeWords, Page, type ReportPicture, type ReportPictures } from '../report/index.js';
import { LENGTH_EDGES_KM, summarizeBy } from '../split/index.js';
import { lengthLikeNames, readerUnits, type StudyRun } from '../study/index.js';
import {
  dayCharts,
  hourCharts,
  hourDayCharts,
  type NamedChart,
  skyCharts,
  splitCharts,
  wrongFixCharts,
} from './annexPictures.js';

/** The charts of a run, drawn: for the report, and as files by name. */
export async function drawPictures(
  run: StudyRun,
): Promise<{ pictures: ReportPictures; files: readonly (readonly [name: string, svg: string])[] }> {
  const files: [string, string][] = [];
  const names = lengthLikeNames(run.results);
  const draw = async (name: string, chart: ChartSpec | null): Promise<ReportPicture | null> => {
    if (chart === null) return null;
    const shown = chartInUnits(chart, readerUnits(run.results.study.reportUnits), names);
    const svg = await renderSvg(shown);
    files.push([name, svg]);
    return { svg, description: shown.description, file: `charts/${name}.svg` };
  };
  const { marks } = run.results;
  const horizontal = await draw('horizontal-error', errorChart(run, 'horizontal'));
  const vertical = await draw('vertical-error', errorChart(run, 'vertical'));
  const maps: ReportPicture[] = [];
  for (const [k, baseName] of run.results.bases.entries()) {
    const ofBase = marks.filter(({ base }) => base === baseName);
    // A name of a base may hold anything: files are numbered instead.
    const picture = await draw(
      `map-${k + 1}`,
      ofBase.length === 0 ? null : markMapChart({ marks: ofBase, baseName }),
    );
    if (picture !== null) maps.push(picture);
  }
  const markMeans = await draw(
    'mark-means',
    marks.length === 0 ? null : markMeansChart({ marks, heights: run.results.heights }),
  );
  const drawAll = async (charts: readonly NamedChart[]): Promise<ReportPicture[]> => {
    const drawn: ReportPicture[] = [];
    for (const [name, chart] of charts) drawn.push((await draw(name, chart))!);
    return drawn;
  };
  const [days, hours] = [await drawAll(dayCharts(run)), await drawAll(hourCharts(run))];
  const hourDays = await drawAll(hourDayCharts(run));
  const [splits, sky] = [await drawAll(splitCharts(run)), await drawAll(skyCharts(run))];
  const wrongFixes = await drawAll(wrongFixCharts(run));
  const jobs = await drawAll(
    run.results.jobs.map((job, k): NamedChart => [`job-${k + 1}`, jobMapChart({ job })]),
  );
  const moves = await draw('rule-moves', movesChart(run));
  const proof = await draw('back-test', proofChart(run));
  const pictures = { proof, moves, horizontal, vertical, maps, markMeans };
  return { pictures: { ...pictures, days, hours, hourDays, splits, sky, wrongFixes, jobs }, files };
}

function proofChart({ results: { backTest, study } }: StudyRun): ChartSpec | null {
  if (!backTest.some(({ lengthClasses }) => lengthClasses.length > 0)) return null;
  return backTestChart({ backTest, units: readerUnits(study.reportUnits) });
}

function movesChart({ results }: StudyRun): ChartSpec | null {
  const { ruleMoves: moves, study } = results;
  if (!moves.some(({ maximumBaselineKm }) => maximumBaselineKm)) return null;
  const page = new Page(results);
  return ruleMovesChart({
    moves,
    words: (move) => changeWords(page, move),
    units: readerUnits(study.reportUnits),
  });
}

function errorChart(run: StudyRun, component: Component): ChartSpec | null {
  const { models, results } = run;
  const model = models.find((candidate) => candidate.component === component);
  if (model === undefined) return null;
  const errors = errorsAsFitted(run, model);
  const fit = results.fits.find((one) => one.basisOfRule && one.component === component);
  const rule = results.rules.find((candidate) => candidate.component === component);
  return errorByBaselineChart({
    errors,
    model,
    ppm: fit?.ppm,
    bins: summarizeBy(
      errors,
      { column: 'baselineKm', edges: LENGTH_EDGES_KM },
      { confidence: model.confidence },
    ),
    ...(results.specSheet === null ? {} : { specSheet: results.specSheet }),
    ...(rule === undefined ? {} : { tolerance: rule, rule }),
    heights: results.heights,
  });
}

/**
 * The errors counted from the reference of a fit, so that points and curve tell of the same; suspected wrong fixes are no
 * part of it.
 */
function errorsAsFitted(
  { errors, weights }: StudyRun,
  { component, reference }: ErrorModel,
): Pick<OccupationError, 'day' | 'baselineKm' | 'east' | 'north' | 'up'>[] {
  const { data } = referenceData(errors, { component, reference, weights });
  return Array.from(data.rows.keys())
    .filter((i) => data.w[i]! >= 0.5)
    .map((i) => {
      const error = errors[data.rows[i]!]!;
      const [first, second] = data.components;
      const { day, baselineKm, east, north, up } = error;
      return component === 'horizontal'
        ? { day, baselineKm, east: first![i]!, north: second![i]!, up }
        : { day, baselineKm, east, north, up: first![i]! };
    });
}
