import { rankAssociation } from '../../src/days/association.js';
import { readIndices, readTecMaps } from '../../src/ionosphere/index.js';
import { randomStream } from '../../src/stats/index.js';
import { ionexText } from '../ionosphere/ionexText.js';
import { medianSeconds } from './timing.js';

const INTERVALS_SINCE_1932 = 275_000;
const THREE_HOURS_MS = 10_800_000;

/** Every quarter of an hour of a day, on the usual global grid. */
const quarterHours = (): string =>
  ionexText(
    Array.from({ length: 97 }, (_, k) => ({
      epoch: [2025, 3, 1, Math.floor(k / 4), 15 * (k % 4), 0],
      value: (latitude: number, longitude: number) => Math.round(100 + latitude + longitude / 3 + k),
    })),
    { latitudes: [87.5, -87.5, -2.5], longitudes: [-180, 180, 5], intervalSeconds: 900 },
  );

/** The whole 3-hour file, from 1932 on. */
function threeHourRows(): string {
  const startMs = Date.UTC(1932, 0, 1);
  return Array.from({ length: INTERVALS_SINCE_1932 }, (_, i) => {
    const date = new Date(startMs + i * THREE_HOURS_MS).toISOString();
    const hour = Number(date.slice(11, 13));
    const days = [i / 8, i / 8 + 0.0625].map((count) => count.toFixed(5)).join(' ');
    return `${date.slice(0, 10).replaceAll('-', ' ')} ${hour.toFixed(1)} ${(hour + 1.5).toFixed(2)} ${days}  2.667   12 1`;
  }).join('\n');
}

/** Reading of index and map files, and the permutation test of a year of days. */
export async function benchIonosphere(): Promise<void> {
  const milliseconds = async (what: string, work: () => unknown): Promise<void> => {
    console.log(`${what}: ${(1000 * (await medianSeconds(5, work))).toFixed(1)} ms`);
  };
  const maps = quarterHours();
  await milliseconds(`97 global maps, ${(maps.length / 1e6).toFixed(1)} MB`, () => readTecMaps(maps, 'maps'));
  const rows = threeHourRows();
  await milliseconds(`${INTERVALS_SINCE_1932} intervals of Kp`, () => readIndices(rows, 'kp'));
  const draw = randomStream(1);
  const [x, y] = [Array.from({ length: 365 }, draw), Array.from({ length: 365 }, draw)];
  await milliseconds('rank association of 365 days, 9999 orders', () =>
    rankAssociation(x, y, { random: randomStream(2) }),
  );
}
