import { metresPer } from '../geodesy/index.js';

/** Units in which pages and charts are written; `results.json` and tables for analysts stay metric. */
export const REPORT_UNITS = ['metric', 'us-survey-foot', 'international-foot'] as const;
export type ReportUnits = (typeof REPORT_UNITS)[number];

/** A unit of length: its name on a page, its size, and how many decimals say what a measurement can say. */
export interface ReaderUnit {
  readonly name: string;
  /** How many of it are one of ours: mm for errors, km for distances, m for heights. */
  readonly perOurs: number;
  readonly decimals: number;
}

/** What errors, distances and heights are written in. */
export interface ReaderUnits {
  readonly kind: ReportUnits;
  /** Said once on every page. */
  readonly words: string;
  /** Ours is mm. */
  readonly error: ReaderUnit;
  /** Ours is km. */
  readonly distance: ReaderUnit;
  /** Ours is m. */
  readonly height: ReaderUnit;
}

const FEET_IN_A_MILE = 5280;

/** The units of a reader. Feet are those of the study, and a mile is 5280 of them. */
export function readerUnits(kind: ReportUnits): ReaderUnits {
  if (kind === 'metric') {
    return {
      kind,
      words: 'Errors are in millimetres (mm), distances in kilometres (km).',
      error: { name: 'mm', perOurs: 1, decimals: 1 },
      distance: { name: 'km', perOurs: 1, decimals: 1 },
      height: { name: 'm', perOurs: 1, decimals: 0 },
    };
  }
  const foot = metresPer(kind);
  const name = kind === 'us-survey-foot' ? 'US survey feet' : 'international feet';
  return {
    kind,
    words: `Errors are in ${name} (ft), distances in miles of 5280 such feet (mi); 1 ppm is 1 ft in 1 000 000 ft.`,
    error: { name: 'ft', perOurs: 0.001 / foot, decimals: 3 },
    distance: { name: 'mi', perOurs: 1000 / (FEET_IN_A_MILE * foot), decimals: 1 },
    height: { name: 'ft', perOurs: 1 / foot, decimals: 0 },
  };
}
