import type { Control } from '../control/index.js';
import type { DailyFactor } from '../days/index.js';
import type { OccupationError, Visit } from '../errors/index.js';
import { joinIndices, outsideMapsNote } from '../ionosphere/index.js';
import { type Message, message } from '../logs/index.js';
import { readSkyFiles } from './skyFiles.js';
import { skyOfDays } from './skyOfDays.js';
import type { Sky } from './skyResult.js';
import type { Study } from './study.js';
import { usualBase } from './usualBase.js';

/** What of a run the sky is compared with. */
export interface ReadStudy {
  readonly control: Control;
  readonly errors: readonly OccupationError[];
  readonly visits: readonly Visit[];
}

/**
 * The sky over a study out of its index and map files; null, with the reason in a message, where there are none or none
 * can be read. Of the other results only the conditions of rules name something of it.
 * @param factors of both components; empty where days cannot be judged
 */
export async function studySky(
  study: Study,
  { control, errors, visits }: ReadStudy,
  factors: readonly DailyFactor[],
): Promise<{ sky: Sky | null; messages: readonly Message[] }> {
  if (study.indices.length + study.maps.length === 0) return { sky: null, messages: [noFiles()] };
  const { indices, maps, files, messages: told } = await readSkyFiles(study);
  const base = usualBase(errors);
  if ((indices === null && maps === null) || base === null)
    return { sky: null, messages: [...told, nothingKnown(base === null)] };
  const { latitudeDeg, longitudeDeg } = control.bases.get(base)!.position;
  const days = [...new Set([...errors, ...visits].map(({ day }) => day))].sort();
  const site = { latitudeDeg, longitudeDeg };
  const { timeZone, confidence, seed } = study;
  const found = skyOfDays({ days, timeZone, site, indices, maps, factors, visits, confidence, seed });
  const joined = indices === null ? [] : joinIndices(errors, indices).messages;
  const starts = errors.map(({ startMs }) => startMs);
  const unreached = maps === null ? null : outsideMapsNote(maps, starts, 'occupation');
  // What occupations miss says it in numbers of the study; the hours of the days would say it again.
  const rest = found.messages.filter(({ code }) => unreached === null || code !== unreached.code);
  return {
    sky: {
      site: { base, ...site },
      files,
      days: found.days,
      associations: found.associations,
      thresholds: found.thresholds,
    },
    messages: [...told, ...joined, ...(unreached === null ? [] : [unreached]), ...rest],
  };
}

/** Solar radio flux of the days of which it is known. */
export const f107OfDays = (sky: Sky | null): Map<string, number> =>
  new Map(sky?.days.flatMap(({ day, f107 }) => (f107 === null ? [] : [[day, f107]])));

const noFiles = (): Message =>
  message(
    'info',
    'no-sky-files',
    'The study names no file of geomagnetic indices or ionosphere maps, so its days are not compared with the sky. Name public files under indices and maps to have that.',
  );

const nothingKnown = (noOccupations: boolean): Message =>
  message(
    'warning',
    'sky-not-known',
    noOccupations
      ? 'Without occupations there are no days to compare with the sky. The account above says what became of the rows.'
      : 'No file of indices or maps could be used, so the days are not compared with the sky. The messages above say what is wrong with each.',
  );
