import { type ChildProcess, fork } from 'node:child_process';
import { availableParallelism } from 'node:os';
import { fileURLToPath } from 'node:url';
import type { TriedCampaign } from './tryCampaign.js';
import type { Task } from './worker.js';

/** Seeds a worker is given at a time. */
const SEEDS_AT_ONCE = 10;

/** Tries campaigns in as many processes as there are processors; the order of the results is that of the seeds. */
export async function tryInWorkers(
  work: readonly (readonly number[])[],
  onWorld: (world: number, campaigns: readonly TriedCampaign[]) => void,
): Promise<void> {
  const script = fileURLToPath(new URL('./worker.ts', import.meta.url));
  // The workers start as this process was started, with its loader of TypeScript.
  const workers = Array.from({ length: availableParallelism() }, () => fork(script));
  try {
    for (const [world, seeds] of work.entries()) {
      const tasks = chunks(seeds).map((part): Task => ({ world, seeds: part }));
      const done: TriedCampaign[][] = [];
      let next = 0;
      const runs = workers.map(async (worker) => {
        while (next < tasks.length) {
          const mine = next++;
          done[mine] = await ask(worker, tasks[mine]!);
        }
      });
      await Promise.all(runs);
      onWorld(world, done.flat());
    }
  } finally {
    for (const worker of workers) worker.disconnect();
  }
}

function ask(worker: ChildProcess, task: Task): Promise<TriedCampaign[]> {
  return new Promise((resolve, reject) => {
    const gone = (code: number | null): void =>
      reject(new Error(`a worker ended with code ${code} while it tried campaigns`));
    worker.once('exit', gone);
    worker.once('message', (result) => {
      worker.off('exit', gone);
      resolve(result as TriedCampaign[]);
    });
    worker.send(task);
  });
}

const chunks = (seeds: readonly number[]): number[][] =>
  Array.from({ length: Math.ceil(seeds.length / SEEDS_AT_ONCE) }, (_, k) =>
    seeds.slice(k * SEEDS_AT_ONCE, (k + 1) * SEEDS_AT_ONCE),
  );
