import { tryCampaign } from './tryCampaign.js';
import { WORLDS } from './worlds.js';

/** What a worker is asked for: campaigns of one world. */
export interface Task {
  readonly world: number;
  readonly seeds: readonly number[];
}

process.on('message', ({ world, seeds }: Task) => {
  process.send!(seeds.map((seed) => tryCampaign(WORLDS[world]!, seed)));
});
