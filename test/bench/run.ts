/*
 * Speed and memory, printed, never asserted: machines are noisy, so ratios are taken within one run.
 * `npm run bench` runs all parts, `npm run bench -- fit` those named; `days`, `rule` and `coverage` take some minutes.
 */
import { benchCoverage } from './coverage.js';
import { benchDays } from './days.js';
import { benchDemo } from './demo.js';
import { benchFit } from './fit.js';
import { benchFuzz } from './fuzz.js';
import { benchGroups } from './groups.js';
import { benchIonosphere } from './ionosphere.js';
import { benchPages } from './pages.js';
import { benchRead } from './read.js';
import { benchRule } from './rule.js';

const PARTS = {
  demo: benchDemo,
  read: benchRead,
  pages: benchPages,
  fit: benchFit,
  fuzz: benchFuzz,
  groups: benchGroups,
  ionosphere: benchIonosphere,
  days: benchDays,
  rule: benchRule,
  coverage: benchCoverage,
};

const wanted = process.argv.slice(2);
for (const [name, part] of Object.entries(PARTS)) {
  if (wanted.length > 0 && !wanted.includes(name)) continue;
  console.log(`\n## ${name}`);
  await part();
}
