import { type SimulatedOccupation, simulateErrors } from '../../src/campaign/index.js';
import { dayModel, judgeDegradedDays } from '../../src/days/index.js';
import { fitErrorModel } from '../../src/fit/index.js';

/*
 * What degraded days are put down to, where the cause is known: bad days of the simulation grow with distance; faults on
 * the ground are put into one day of a campaign.
 */

const REPLICATES = 50;

interface Fault {
  readonly name: string;
  readonly badDays: boolean;
  readonly change: (
    row: SimulatedOccupation,
    onDay: readonly SimulatedOccupation[],
  ) => Partial<SimulatedOccupation>;
}

const larger = (row: SimulatedOccupation, factor: number) => ({
  east: factor * row.east,
  north: factor * row.north,
  up: factor * row.up,
});
const farthest = (rows: readonly SimulatedOccupation[]): SimulatedOccupation =>
  rows.reduce((far, row) => (row.baselineKm > far.baselineKm ? row : far));

const FAULTS: readonly Fault[] = [
  { name: '3 bad days in a row, ppm × 2 to 5', badDays: true, change: () => ({}) },
  {
    name: 'base off by 40 mm',
    badDays: false,
    change: ({ east, north, up }) => ({ east: east + 32, north: north - 24, up: up + 40 }),
  },
  {
    name: 'errors of one crew × 4',
    badDays: false,
    change: (row, onDay) => (row.crew === onDay[0]!.crew ? larger(row, 4) : {}),
  },
  {
    name: 'farthest mark off by 200 mm',
    badDays: false,
    change: (row, onDay) =>
      row.mark === farthest(onDay).mark ? { east: row.east + 200, up: row.up + 200 } : {},
  },
];

/** Prints counts of verdicts over degraded days with the fault; the day of a fault is the tenth. */
export function benchDayVerdicts(): void {
  console.log(
    `\n${REPLICATES} campaigns of 30 days each, seeds 200 000 + 1000 f + r for fault f = 0 … ${FAULTS.length - 1}:\n`,
  );
  console.log('| fault | component | days with it | named | verdicts on those named |');
  console.log('|---|---|---|---|---|');
  FAULTS.forEach(({ name, badDays, change }, f) => {
    for (const component of ['horizontal', 'vertical'] as const) {
      let [faulty, named] = [0, 0];
      const verdicts = new Map<string, number>();
      for (let r = 0; r < REPLICATES; r++) {
        const { rows, truth } = simulateErrors({
          seed: 200_000 + 1000 * f + r,
          days: 30,
          dayFactorLogSd: 0.25,
          base: { mounting: 'tripod' },
          setupSigmaMm: { east: 2, north: 2, up: 3 },
          badDays: badDays ? { runs: 1, runLength: 3 } : null,
        });
        const bad = new Set(
          badDays ? truth.days.filter((each) => each.bad).map(({ day }) => day) : [truth.days[9]!.day],
        );
        const onDay = rows.filter(({ day }) => bad.has(day));
        const changed = rows.map((row) => (bad.has(row.day) ? { ...row, ...change(row, onDay) } : row));
        faulty += bad.size;
        for (const { day, verdict } of judgeDegradedDays(
          changed,
          dayModel(changed, fitErrorModel(changed, { component })),
        )) {
          if (!bad.has(day)) continue;
          named += 1;
          verdicts.set(verdict, (verdicts.get(verdict) ?? 0) + 1);
        }
      }
      const list = [...verdicts]
        .sort(([, a], [, b]) => b - a)
        .map(([verdict, count]) => `${verdict} ${count}`)
        .join(', ');
      console.log(`| ${name} | ${component} | ${faulty} | ${named} | ${list} |`);
    }
  });
}
