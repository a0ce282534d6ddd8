import type { ReaderUnit, ReaderUnits } from './readerUnits.js';
import type { Results } from './results.js';

const NUMBER = '[−+-]?\\d+(?:[\\u00a0\\u202f]\\d{3})*(?:\\.\\d+)?';
/** One or several numbers with one of our units of length; `mm per km` is a ratio and stays. */
const LENGTHS = new RegExp(
  `(?<![\\w.])((?:${NUMBER}(?: to | and | or |, | / |–))*${NUMBER})([ \\u00a0])(mm|km|m)\\b(?! per km)`,
  'g',
);

/** What stands in quotes is somebody's own words, whatever is in it. */
const QUOTED = '"(?:[^"\\\\]|\\\\.)*"';

/**
 * A sentence whose lengths are turned into the units of a reader: `7.6 to 8.3 mm`, `8.9 km`. Distances are rounded down,
 * since they may be promises. Texts in quotes stay as they are.
 * @param names that look like lengths, such as a mark "12 km", and stay wherever they stand; see {@link lengthLikeNames}
 */
export function textInUnits(sentence: string, units: ReaderUnits, names: readonly string[] = []): string {
  if (units.kind === 'metric') return sentence;
  // Longer names first: one may hold another.
  const literal = [...names]
    .sort((a, b) => b.length - a.length)
    .map((name) => `(?<![\\w.])${name.replace(/[.*+?^${}()|[\]\\]/g, '\\$&')}(?!\\w)`);
  const kept = [QUOTED, ...literal];
  // Of a split by a group every second part is what was kept.
  return sentence
    .split(new RegExp(`(${kept.join('|')})`, 'g'))
    .map((part, k) => (k % 2 === 1 ? part : turned(part, units)))
    .join('');
}

/** The names of a study in which a length could be read. */
export const lengthLikeNames = (results: Results): string[] =>
  givenNames(results).filter((name) => new RegExp(LENGTHS.source).test(name));

/** What the study calls its files, marks, bases, crews and receivers, and itself. */
export function givenNames(results: Results): string[] {
  const { study, marks, controlMarks, siteMarks, bases, crews, rovers, setups, jobs, files, inputs } =
    results;
  const names = [
    study.title,
    study.surveyor ?? '',
    ...marks.map(({ mark }) => mark),
    ...controlMarks.map(({ mark }) => mark),
    ...siteMarks,
    ...bases,
    ...crews,
    ...rovers,
    ...setups.map(({ setup }) => setup),
    ...jobs.flatMap((job) => [job.file, ...job.points.map(({ point }) => point)]),
    ...[...files, ...inputs].map(({ file }) => file),
  ];
  return [...new Set(names)];
}

const turned = (text: string, units: ReaderUnits): string =>
  text.replace(LENGTHS, (_, numbers: string, blank: string, unit: OurUnit) => {
    const written = numbers.replace(new RegExp(NUMBER, 'g'), (one) => inUnit(one, unit, units));
    return `${written}${blank}${unitOf(unit, units).name}`;
  });

type OurUnit = 'mm' | 'km' | 'm';

function inUnit(written: string, unit: OurUnit, units: ReaderUnits): string {
  const value = Number(written.replace(/[\u00a0\u202f+]/g, '').replace('−', '-'));
  const { perOurs, decimals } = unitOf(unit, units);
  const step = 10 ** decimals;
  const size = Math.abs(value) * perOurs;
  const shown = unit === 'km' ? Math.floor(size * step + 1e-9) / step : size;
  const sign = value < 0 ? '−' : written.startsWith('+') ? '+' : '';
  return `${sign}${shown.toFixed(decimals)}`;
}

/** Heights in sentences have a decimal, which tables spare. */
function unitOf(unit: OurUnit, { error, distance, height }: ReaderUnits): ReaderUnit {
  return unit === 'mm' ? error : unit === 'km' ? distance : { ...height, decimals: 1 };
}
