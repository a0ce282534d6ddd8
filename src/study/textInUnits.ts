import type { ReaderUnit, ReaderUnits } from './readerUnits.js';

const NUMBER = '[−+-]?\\d+(?:[\\u00a0\\u202f]\\d{3})*(?:\\.\\d+)?';
/** One or several numbers with one of our units of length; `mm per km` is a ratio and stays. */
const LENGTHS = new RegExp(
  `(?<![\\w.])((?:${NUMBER}(?: to | and | or |, | / |–))*${NUMBER})([ \\u00a0])(mm|km|m)\\b(?! per km)`,
  'g',
);

/**
 * A sentence whose lengths are turned into the units of a reader: `7.6 to 8.3 mm`, `8.9 km`. Distances are rounded down,
 * since they may be promises.
 */
export function textInUnits(sentence: string, units: ReaderUnits): string {
  if (units.kind === 'metric') return sentence;
  return sentence.replace(LENGTHS, (_, numbers: string, blank: string, unit: OurUnit) => {
    const { name } = unitOf(unit, units);
    const turned = numbers.replace(new RegExp(NUMBER, 'g'), (written) => inUnit(written, unit, units));
    return `${turned}${blank}${name}`;
  });
}

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
