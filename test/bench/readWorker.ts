import { performance } from 'node:perf_hooks';
import type { Base, Mark } from '../../src/control/index.js';
import { computeErrors, formOccupations } from '../../src/errors/index.js';
import { readLogs, totalAccount } from '../../src/logs/index.js';
import { markLatitude } from './read.js';

const [path, markCount] = process.argv.slice(2) as [string, string];
const marks = new Map(
  Array.from({ length: Number(markCount) }, (_, k): [string, Mark] => [
    `M${k}`,
    {
      name: `M${k}`,
      position: { latitudeDeg: markLatitude(k), longitudeDeg: -18.40070001, heightM: 133.7 },
      horizontalSigmaMm: Number.NaN,
      verticalSigmaMm: Number.NaN,
      source: '',
      sky: '',
    },
  ]),
);
const base: Base = {
  name: 'B',
  position: { latitudeDeg: 44.3, longitudeDeg: -18.4, heightM: 100 },
  mounting: 'pillar',
};
const control = { marks, bases: new Map([['B', base]]) };

const start = performance.now();
const file = { path, file: 'log.csv', layout: { kind: 'delimited' }, coordinates: 'geographic' } as const;
const { occupations, files } = await formOccupations(readLogs([file], { timeZone: null }), control);
computeErrors(occupations, control);
const seconds = (performance.now() - start) / 1000;
const { read, used } = totalAccount(files);
const peakMb = process.resourceUsage().maxRSS / 1024;
console.log(JSON.stringify({ seconds, peakMb, occupations: occupations.length, read, used }));
