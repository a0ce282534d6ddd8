// One reading of a log by the built code, from rows to errors of occupations; prints what it took as JSON.
import { computeErrors, formOccupations, readLogs } from '../../dist/index.js';

const [kind, path] = process.argv.slice(2);
/** Coordinates that hold on all days. */
const always = (position) => {
  const coordinates = {
    position,
    horizontalSigmaMm: Number.NaN,
    verticalSigmaMm: Number.NaN,
    source: '',
    frame: '',
    epoch: Number.NaN,
    from: '',
    to: '',
  };
  return { ...coordinates, versions: [coordinates] };
};
const marks = new Map(
  Array.from({ length: 12 }, (_, k) => {
    const position = { latitudeDeg: 44.3 + 0.02 * (k + 1), longitudeDeg: -18.40070001, heightM: 133.7 };
    return [`M${k}`, { ...always(position), name: `M${k}`, sky: '' }];
  }),
);
const base = {
  ...always({ latitudeDeg: 44.3, longitudeDeg: -18.4, heightM: 100 }),
  name: 'B',
  mounting: 'pillar',
};
const layout = kind === 'nmea' ? { kind, constants: { mark: 'M0' } } : { kind: 'delimited' };
const file = { path, file: 'log', layout, coordinates: 'geographic' };

const start = performance.now();
const before = process.cpuUsage();
const control = { marks, bases: new Map([['B', base]]) };
// `rows` reads alone: positions are made and let go.
if (kind === 'rows') {
  let positions = 0;
  for await (const batch of readLogs([file], { timeZone: null })) positions += batch.positions.length;
  const { user, system } = process.cpuUsage(before);
  console.log(JSON.stringify({ cpuSeconds: (user + system) / 1e6, read: positions }));
  process.exit();
}
const { occupations, files } = await formOccupations(readLogs([file], { timeZone: null }), control);
const reduced = process.cpuUsage(before);
computeErrors(occupations, control);
const { user, system } = process.cpuUsage(before);
console.log(
  JSON.stringify({
    occupationsCpuSeconds: (reduced.user + reduced.system) / 1e6,
    cpuSeconds: (user + system) / 1e6,
    wallSeconds: (performance.now() - start) / 1000,
    peakMb: process.resourceUsage().maxRSS / 1024,
    read: files[0].read,
    used: files[0].used,
    occupations: occupations.length,
  }),
);
