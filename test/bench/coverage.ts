import { efficiency } from './coverageStudy/efficiency.js';
import { HEAD, intervalLine, WRONG_HEAD, wrongLine } from './coverageStudy/table.js';
import { tryInWorkers } from './coverageStudy/workers.js';
import { WORLDS, type World } from './coverageStudy/worlds.js';

/*
 * How often the intervals of constant, ppm and σ(10 km) hold the truth, on simulated campaigns that go the way of a
 * study; wrong fixes found and falsely named; efficiency where the model is true. Prints Markdown, of which
 * docs/evidence-coverage.md holds a copy.
 */

/** Campaigns of a world: fewer of the long ones, which take longer and vary less. */
const campaignsOf = ({ days }: World): number => (days <= 15 ? 200 : days <= 30 ? 120 : days <= 60 ? 80 : 40);

const seedOf = (world: number, campaign: number): number => 10_000 * (world + 1) + campaign;

export async function benchCoverage(): Promise<void> {
  const work = WORLDS.map((world, w) =>
    Array.from({ length: campaignsOf(world) }, (_, r) => seedOf(w, r + 1)),
  );
  const wrong: string[] = [];
  console.log(`Seeds 10 000 w + r for world w = 1 … ${WORLDS.length} and campaign r:\n\n${HEAD}`);
  await tryInWorkers(work, (w, campaigns) => {
    console.log(intervalLine(WORLDS[w]!, campaigns));
    const line = wrongLine(WORLDS[w]!, campaigns);
    if (line !== null) wrong.push(line);
  });
  console.log(`\n${WRONG_HEAD}\n${wrong.join('\n')}`);
  efficiency();
}
