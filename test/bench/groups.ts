import { simulateErrors } from '../../src/campaign/index.js';
import { fitByGroup } from '../../src/fit/index.js';
import { randomStream } from '../../src/stats/index.js';

const STUDIES = 400;

type Row = ReturnType<typeof simulateErrors>['rows'][number];

/** Names the crew of an occupation by its day, counted from 0. */
type Crew = (row: Row, day: number) => string;

const DESIGNS: readonly [string, number, Crew][] = [
  ['3 crews on every one of 30 days', 30, ({ crew }) => crew],
  ['2 crews on every one of 12 days', 12, ({ crew }) => (crew === 'C' ? 'A' : crew)],
  ['15 days of one crew, 15 of another', 30, (_, day) => (day < 15 ? 'A' : 'B')],
  ['6 days of one crew, 24 of another', 30, (_, day) => (day < 6 ? 'A' : 'B')],
  ['3 crews by turns over 30 days', 30, (_, day) => 'ABC'[day % 3]!],
];

/** How often the test of groups calls equal crews different, and how often it finds one with half as much again. */
export async function benchGroups(): Promise<void> {
  console.log(
    `shares of ${STUDIES} studies told to differ at the level .05 (Monte-Carlo error .011 at the level)`,
  );
  for (const [name, days, crewOf] of DESIGNS) {
    const counts = [1, 1.5].map((factor) => {
      let told = 0;
      for (let seed = 1; seed <= STUDIES; seed++) {
        const { rows } = simulateErrors({ seed, days, occupationsPerDay: { from: 15, to: 25 } });
        const names = [...new Set(rows.map(({ day }) => day))];
        const errors = rows.map((row) => {
          const crew = crewOf(row, names.indexOf(row.day));
          return { ...row, crew, up: crew === 'A' ? row.up * factor : row.up };
        });
        const random = randomStream(seed, 'flips');
        const { pValue } = fitByGroup(errors, { by: 'crew', component: 'vertical', random, flips: 199 });
        told += Number(pValue !== null && pValue <= 0.05);
      }
      return told / STUDIES;
    });
    console.log(
      `  ${name}: ${counts[0]!.toFixed(3)} when equal, ${counts[1]!.toFixed(3)} when one crew has 1.5 times the errors`,
    );
  }
}
