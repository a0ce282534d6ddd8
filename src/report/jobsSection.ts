import type { JobResult } from '../study/index.js';
import { type Html, html } from './html.js';
import type { Page } from './page.js';
import { figure, type ReportPicture } from './pictures.js';
import { type Column, table } from './table.js';

type Point = JobResult['points'][number];
type Reach = JobResult['reaches'][number];

/** More points than these are no letter any more. */
const MOST_POINTS = 40;

/** Which points of the jobs the rules reach, and what can be promised there. */
export function jobsSection(page: Page, pictures: readonly ReportPicture[]): Html {
  const { jobs } = page.results;
  if (jobs.length === 0) return html``;
  return html`<section id="jobs"><h2>The points of your jobs</h2>
<ul>${jobs.map((job) => html`<li>${demand(page, job)}: ${page.text(job.sentence)}</li>\n`)}</ul>
${figure(pictures[0] ?? null)}
${groups(jobs).map((same) => pointTable(page, same))}
</section>
`;
}

const demand = (page: Page, job: JobResult): Html =>
  html`${page.name(job.file)}, ${page.number(job, 'limitMm', 'limit')} ${page.units.error.name} in ${job.component === 'horizontal' ? 'plan' : 'height'}`;

/** Jobs of the same points, component and share differ by their limits alone, so that one table holds them. */
function groups(jobs: readonly JobResult[]): JobResult[][] {
  const found = new Map<string, JobResult[]>();
  for (const job of jobs) {
    const points = job.points.map(({ point }) => point);
    const key = JSON.stringify([job.file, job.component, job.share, job.dayShare, job.confidence, points]);
    found.set(key, [...(found.get(key) ?? []), job]);
  }
  return [...found.values()];
}

function pointTable(page: Page, jobs: readonly JobResult[]): Html {
  const first = jobs[0]!;
  const { distance, error } = page.units;
  const caption = html`${page.name(first.file)}, ${first.component === 'horizontal' ? 'plan' : 'height'}: what ${page.number(first, 'share', 'share')} of positions hold on ${page.number(first, 'dayShare', 'share')} of days`;
  const columns: Column<Point>[] = [
    { head: 'Point', cell: ({ point }) => page.name(point), text: true },
    { head: 'Best base', cell: ({ bestBase }) => page.name(bestBase), text: true },
    { head: `Distance, ${distance.name}`, cell: (point) => page.number(point, 'baselineKm', 'distance') },
    {
      head: `Can be promised, ${error.name}`,
      cell: (point) => page.number(point, 'promisedMm', 'error rounded up'),
    },
    ...jobs.map(
      (job): Column<Point> => ({
        head: html`${page.number(job, 'limitMm', 'limit')} ${error.name}`,
        cell: (_, k) => holdsWords(job.points[k]!),
        text: true,
      }),
    ),
  ];
  return table<Point>(caption, first.points, columns, {
    most: MOST_POINTS,
    words: html`Shown are the first <data value="${MOST_POINTS}" data-cut="jobs">${MOST_POINTS}</data> of ${page.lengthOf(first.points, 'point')}; all of them stand in tables/jobs.csv.`,
  });
}

function holdsWords({ needsAnotherBase }: Point): string {
  if (needsAnotherBase === null) return 'no rule';
  return needsAnotherBase ? 'beyond' : 'holds';
}

/** Every point from every base, with a map of each job. */
export function annexJobs(page: Page, pictures: readonly ReportPicture[]): Html {
  const { jobs } = page.results;
  if (jobs.length === 0) return html``;
  return html`<section id="jobs"><h2>The points of jobs from every base</h2>
${pictures.map(figure)}${jobs.map((job) => reachTable(page, job))}
</section>
`;
}

function reachTable(page: Page, job: JobResult): Html {
  const { distance, error, height } = page.units;
  const bases = job.bases.map(
    (base) =>
      html`<li>From ${page.name(base.base)} the rule reaches ${base.maximumBaselineKm === null ? 'nothing' : html`${page.number(base, 'maximumBaselineKm', 'distance, rounded down')} ${distance.name}`}${base.reason === null ? '' : `: ${page.text(base.reason)}`}${base.baseOfRule ? '' : ' (no base of the study)'}.</li>\n`,
  );
  return html`${table<Reach>(
    demand(page, job),
    job.reaches,
    [
      { head: 'Point', cell: ({ point }) => page.name(point), text: true },
      { head: 'Base', cell: ({ base }) => page.name(base), text: true },
      { head: `Distance, ${distance.name}`, cell: (row) => page.number(row, 'baselineKm', 'distance') },
      {
        head: `Above the base, ${height.name}`,
        cell: (row) => page.number(row, 'heightDifferenceM', 'height'),
      },
      {
        head: `Can be promised, ${error.name}`,
        cell: (row) => page.number(row, 'promisedMm', 'error rounded up'),
      },
      {
        head: 'Reached',
        cell: ({ holds }) => (holds === null ? 'no rule' : holds ? 'yes' : 'no'),
        text: true,
      },
      { head: 'Why nothing is promised', cell: ({ reason }) => page.text(reason ?? ''), text: true },
    ],
    {
      most: MOST_REACHES,
      words: html`Shown are the first <data value="${MOST_REACHES}" data-cut="jobs">${MOST_REACHES}</data> of ${page.lengthOf(job.reaches, 'line')}; all of them stand in tables/jobs.csv.`,
    },
  )}
<ul>${bases}</ul>
`;
}

const MOST_REACHES = 200;
