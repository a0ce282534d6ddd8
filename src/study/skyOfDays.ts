import type { DailyFactor } from '../days/index.js';
import type { Visit } from '../errors/index.js';
import type { Geographic } from '../geodesy/index.js';
import {
  type DaySpan,
  type DayTec,
  dayIndices,
  dayTec,
  expectedShorteningPpm,
  type GeomagneticIndices,
  localDaySpan,
  solarDaySpan,
  type TecMaps,
} from '../ionosphere/index.js';
import type { Message } from '../logs/index.js';
import { skyAssociations, skyThresholds } from './skyAssociations.js';
import type { Sky, SkyDay } from './skyResult.js';

/** What {@link skyOfDays} puts together. */
export interface SkyInput {
  /** Days of the study in order, YYYY-MM-DD. */
  readonly days: readonly string[];
  /** Zone of the days; null for days of local mean solar time at the site. */
  readonly timeZone: string | null;
  readonly site: Geographic;
  readonly indices: GeomagneticIndices | null;
  readonly maps: TecMaps | null;
  /** Of both components, in any order; empty where days cannot be judged. */
  readonly factors: readonly DailyFactor[];
  readonly visits: readonly Pick<Visit, 'day' | 'fixedRows'>[];
  readonly confidence: number;
  readonly seed: number;
}

const DAY_MS = 86_400_000;

/** The sky of every day, and what of it goes with daily factors and missing fixes. */
export function skyOfDays(
  input: SkyInput,
): Pick<Sky, 'days' | 'associations' | 'thresholds'> & { readonly messages: readonly Message[] } {
  const { days, timeZone, site, indices, maps, visits } = input;
  const spans = days.map((day) => spanOf(day, timeZone, site));
  const activity = dayIndices(spans, indices ?? { series: {} });
  const tec = maps === null ? null : dayTec(maps, site, withDaysBefore(spans, maps, timeZone, site));
  const tecOf = new Map(tec?.days.map((one) => [one.day, one]));
  const missing = sharesWithoutFix(visits);
  const sky = activity.map(({ day, apMean, kpMax, hp30Max, hp60Max, f107, dstMin, knownShare }): SkyDay => {
    return {
      day,
      ap: known(apMean),
      kpMax: known(kpMax),
      hpMax: known(hp30Max) ?? known(hp60Max),
      f107: known(f107),
      dstMin: known(dstMin),
      indexShare: knownShare,
      ...tecColumns(tecOf.get(day), maps),
      shareWithoutFix: missing.get(day) ?? null,
    };
  });
  const { associations, messages } = skyAssociations(sky, input);
  return {
    days: sky,
    associations,
    thresholds: skyThresholds(sky, input),
    messages: [...(tec?.messages ?? []), ...messages],
  };
}

const known = (value: number): number | null => (Number.isNaN(value) ? null : value);

function tecColumns(
  tec: DayTec | undefined,
  maps: TecMaps | null,
): Pick<SkyDay, 'tecMean' | 'tecMax' | 'gradientMean' | 'tecChange' | 'shorteningPpm' | 'mapShare'> {
  const tecMean = known(tec?.tecMean ?? Number.NaN);
  const shell = maps === null ? {} : { shellHeightKm: maps.shellHeightKm };
  return {
    tecMean,
    shorteningPpm: tecMean === null ? null : expectedShorteningPpm(tecMean, shell),
    tecMax: known(tec?.tecMax ?? Number.NaN),
    gradientMean: known(tec?.gradientMean ?? Number.NaN),
    tecChange: known(tec?.changeFromDayBefore ?? Number.NaN),
    mapShare: tec?.knownShare ?? 0,
  };
}

const spanOf = (day: string, timeZone: string | null, { longitudeDeg }: Geographic): DaySpan =>
  timeZone === null ? solarDaySpan(day, longitudeDeg) : localDaySpan(day, timeZone);

/** The days, and those before them on which no work was done and of which the maps tell all the same. */
function withDaysBefore(
  spans: readonly DaySpan[],
  { epochsMs }: TecMaps,
  timeZone: string | null,
  site: Geographic,
): DaySpan[] {
  const names = new Set(spans.map(({ day }) => day));
  const before = spans
    .map(({ day }) => new Date(Date.parse(`${day}T00:00:00Z`) - DAY_MS).toISOString().slice(0, 10))
    .filter((day) => !names.has(day))
    .map((day) => spanOf(day, timeZone, site))
    .filter(({ startMs, endMs }) => startMs >= epochsMs[0]! && endMs <= epochsMs.at(-1)!);
  return [...spans, ...before].sort((a, b) => a.startMs - b.startMs);
}

function sharesWithoutFix(visits: SkyInput['visits']): Map<string, number> {
  const counts = new Map<string, { all: number; missing: number }>();
  for (const { day, fixedRows } of visits) {
    const { all, missing } = counts.get(day) ?? { all: 0, missing: 0 };
    counts.set(day, { all: all + 1, missing: missing + (fixedRows === 0 ? 1 : 0) });
  }
  return new Map([...counts].map(([day, { all, missing }]) => [day, missing / all]));
}
