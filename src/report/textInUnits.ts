import type { ReaderUnit, ReaderUnits } from '../study/index.js';

/** A number with one of our units of length; `mm per km` is a ratio and stays. */
const LENGTH = /(?<![\w.])([−-]?\d+(?:[  ]\d{3})*(?:\.\d+)?)([  ])(mm|km|m)\b(?! per km)/g;

/** A sentence whose lengths are turned into the units of a reader. */
export function textInUnits(sentence: string, units: ReaderUnits): string {
  if (units.kind === 'metric') return sentence;
  return sentence.replace(LENGTH, (_, written: string, blank: string, unit: 'mm' | 'km' | 'm') => {
    const value = Number(written.replace(/[  ]/g, '').replace('−', '-'));
    const { perOurs, name, decimals } = unitOf(unit, units);
    return `${(value * perOurs).toFixed(decimals).replace('-', '−')}${blank}${name}`;
  });
}

/** Distances in sentences have a decimal more: they are no promise that must be rounded down. */
function unitOf(unit: 'mm' | 'km' | 'm', { error, distance, height }: ReaderUnits): ReaderUnit {
  if (unit === 'mm') return error;
  return unit === 'km' ? { ...distance, decimals: distance.decimals + 1 } : { ...height, decimals: 1 };
}
