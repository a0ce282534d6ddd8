import type { CampaignTruth, SimulatedCampaign } from '../src/campaign/index.js';

/** The demo's study file: comments are for a survey manager who opens it first. */
export const STUDY_TEXT = `# Study file of the demo: check shots of Quillfen Survey on the island of Tellmarrow.
# Firm, island, people and coordinates are invented; see README.md.
# Only "marks", "bases" and "logs" are required. Paths are relative to this file.

title: Check shots, spring 2025

# A day in the report is a calendar day of this zone. Etc/GMT+1 is one hour behind UTC all year
# (the sign of these zone names is the opposite of what one expects).
timeZone: Etc/GMT+1

# What the coordinates in marks, bases and logs are: degrees on WGS 84, heights above the ellipsoid.
coordinates: geographic
heights: {kind: ellipsoidal}

# Points with known coordinates, and the base the receivers worked from.
marks: marks.csv
bases: bases.csv

# Every file that fits the pattern is read. The layout is recognised from the header.
logs:
  - files: logs/*.csv

# Rows outside these days are set aside and counted.
period: {from: 2025-03-03, to: 2025-05-02}

# A pause longer than this ends a visit to a mark, in seconds.
occupations: {gapSeconds: 60}

# What the work must meet: on at least "dayShare" of the days, at least "share" of the positions within
# "limitMm". Horizontal limits are radial (distance in plan from the true place). For each tolerance the
# report says how far from the base it holds.
tolerances:
  - {component: horizontal, limitMm: 25, share: 0.95, dayShare: 0.90, confidence: 0.95}
  - {component: horizontal, limitMm: 40, share: 0.95, dayShare: 0.90, confidence: 0.95}
  - {component: vertical, limitMm: 40, share: 0.95, dayShare: 0.90, confidence: 0.95}
  - {component: vertical, limitMm: 60, share: 0.95, dayShare: 0.90, confidence: 0.95}

# What the receivers' data sheet says, to be compared with what the check shots show. "8 mm + 1 ppm" means
# different things on different sheets: here the two terms are added (linear-sum), the horizontal value is
# radial, and it is a root-mean-square.
specSheet: {horizontal: {constantMm: 8, ppm: 1}, vertical: {constantMm: 15, ppm: 1}, form: linear-sum, axis: radial, level: rms}

# Points that crews will be sent to. For each the results say which base reaches it under the tolerances above (or
# under a limit of its own, column limitMm) and what can be promised there.
jobs:
  - jobs/coast-road.csv

# Standards that clients ask for, each with its conditions checked against the shots.
standards: [NSSDA, ASPRS, ISO 17123-8, GUM, land-title]

# Public files of geomagnetic activity, as they were published, to see what days went with. The one here is
# invented; of the maps of the electron content ("maps") the demo has none.
indices:
  - indices/activity-invented.txt

# Whatever is drawn at random while computing starts from this number, so that a run can be repeated exactly.
seed: 1
`;

/** The demo's README, with the counts of the campaign it describes. */
export function readmeText({ marks, rows, truth }: SimulatedCampaign, files: readonly string[]): string {
  const counts = truth.rows!;
  const { visits, components } = truth;
  const list = files.map((file) => `| \`${file}\` | ${FILES[file] ?? FILES.log} |`).join('\n');
  const far = truth.visitsWithoutFix.filter((visit) => visit.baselineKm > 10).length;
  const bad = truth.days.filter((day) => day.bad);
  const ordinary = truth.days.filter((day) => !day.bad).map((day) => day.factor);
  const two = (value: number): string => value.toFixed(2);
  const percent = (share: number): string => (100 * share).toFixed(1);
  const { fromDay, toDay } = truth.settings.otherBase!;
  const other = { from: truth.days[fromDay - 1]!.day, to: truth.days[toDay - 1]!.day };
  const blunders = truth.blunders.map(blunderText).join('; ');
  const parameters = (['east', 'north', 'up', 'horizontal'] as const)
    .map((name) => {
      const c = components[name];
      return `| ${name} | ${two(c.constantMm)} | ${two(c.medianDayPpm)} | ${two(c.drawnPpm)} | ${two(c.longRunPpm)} |`;
    })
    .join('\n');
  return `# Demo study: check shots of an invented firm

Quillfen Survey is an invented firm on the invented island of Tellmarrow. Its crews, marks and coordinates are
invented too, and every position was simulated: nobody ever stood on these points. The island was put into the open
ocean on purpose.

In the spring of 2025 the firm's two crews shot checks on ${marks.length} marks, ${marks[0]!.baselineKm.toFixed(1)} to ${marks.at(-1)!.baselineKm.toFixed(0)} km from the firm's own base, on ${truth.days.length}
working days. The base stood on a pillar; while that was repaired (${other.from} to ${other.to}), on a tripod over a ground
mark nearby, set up anew every morning. Both crews used all marks, and each went to near and far ones every day. Three
rovers were dealt out to the two crews anew each morning.

## Files

| file | holds |
|---|---|
${list}

Text files are UTF-8 with line feeds. Coordinates are degrees on WGS 84 and ellipsoidal metres; times are UTC.

## What is in the logs

${rows.length} rows: ${counts.fixed} fixed positions on known marks (${visits.withFix} occupations), ${counts.float} float positions, ${counts.unknownMark} on mistyped mark
names, ${counts.wrongMark} under the name of another mark, ${counts.duplicate} that stand twice. ${visits.withoutFix} visits never got a fix, ${far} of them more than 10 km from the base. The columns \`satellites\`,
\`pdop\` and \`age\` look plausible but say nothing about the error.

What a season brings is in it:

- **Wrong fixes**: ${truth.wrongFixes.length} of the ${visits.withFix} occupations (${percent(truth.wrongFixes.length / visits.withFix)} %), the more of them the farther from the base. Each adds a vector of
  50 mm to 1 m in a random direction.
- **Degraded days**: ${bad.map(({ day, factor }) => `${day} (${two(factor)})`).join(', ')}; in brackets the factor on the ppm. The other
  days differ as they do in an ordinary season: their factors go from ${two(Math.min(...ordinary))} to ${two(Math.max(...ordinary))}.
- **A daily course**: the ppm is highest about 14 h solar time, ${two(Math.exp(truth.settings.middayRise))} times the middle of the day's course.
- **Geomagnetic activity**: invented like all else. One storm falls on the two degraded days in a row, others on
  ordinary days, and the single degraded days are quiet.
- **Errors of marks**: the published coordinates are off by ${truth.settings.markSigmaMm.east} mm in east and in north and ${truth.settings.markSigmaMm.up} mm in height
  (standard deviations), as \`marks.csv\` states.
- **Errors of setups**: ${truth.settings.setupSigmaMm.east} mm in east and in north and ${truth.settings.setupSigmaMm.up} mm in height (standard deviations), one draw for the pillar, one
  for every morning on the tripod.
- **Blunders**: ${blunders}.

## The truth

\`truth.json\` says what the positions were made from, so that results can be compared with it. Per component, in mm and
mm per km, as root-mean-square (horizontal: radial):

| component | constant | ppm, median day | ppm, days drawn | ppm, long run |
|---|---|---|---|---|
${parameters}

The error of an occupation is the constant part and the part that grows with distance, added as independent normal
errors. The second is multiplied by a factor of the day, log-normal with median 1 and two to four times as large on
degraded days. Of the first, 40 % of the variance lasts for about ten minutes; the second is common to all crews of a day and lasts for about 40 minutes.
So the occupations of a day are not independent.

- \`settings\`: everything the simulation was told.
- \`components\`: the table above in full, and the ppm of each day (\`dayPpm\`, in the order of \`days\`).
  \`absoluteConstantMm\` also holds the errors of marks and setups.
- \`days\`: each day's factor. \`marks\`, \`setups\`: errors of coordinates and setups, mm; \`baselineKm\` is from the pillar.
- \`visits\`, \`rows\`: counts. \`rows.written\` is the sum of the other five.
- \`visitsWithoutFix\`, \`unknownMarks\`, \`wrongFixes\`, \`blunders\`: each visit concerned.

## How it was made

\`npm run demo:make\` in the project's folder makes all these files again, byte for byte, from the seed in
\`truth.json\`.

## Licence

MIT, as the whole project.
`;
}

function blunderText({ kind, day, mark, rover, upMm, writtenAs }: CampaignTruth['blunders'][number]): string {
  const where = `on ${day} with rover ${rover}`;
  if (kind === 'wrong-mark') return `${where} an occupation on ${mark} was logged as ${writtenAs}`;
  const size = Math.abs(upMm);
  return `${where} the height of the rod on ${mark} was wrong, so that the point came out ${size} mm too ${upMm < 0 ? 'low' : 'high'}`;
}

const FILES: Readonly<Record<string, string>> & { readonly log: string } = {
  'study.yaml': 'the study file, with comments: start here',
  'marks.csv': 'the marks with their known coordinates',
  'bases.csv': 'the bases: the pillar and the ground mark',
  'another-layout/points-2025-03-14.txt':
    'one day as another controller would export it: a point list to try recognising on',
  'jobs/coast-road.csv': 'points of an invented job, two of them with a limit of their own',
  'indices/activity-invented.txt':
    'geomagnetic activity of the season, invented, in the layout of the public daily file',
  'truth.json': 'what the positions were made from',
  'README.md': 'this page',
  log: 'the log of that month (UTC), one row a position',
};
