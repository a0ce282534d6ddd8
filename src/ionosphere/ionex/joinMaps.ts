import { type Message, message } from '../../logs/index.js';
import { counted, dayWords, instantWords } from '../words.js';
import { mapsReach } from './tecAt.js';
import type { TecMaps } from './tecMaps.js';

/** Maps of several files as one series. */
export interface JoinedMaps {
  readonly maps: TecMaps;
  readonly messages: readonly Message[];
}

/**
 * Puts the maps of several files, mostly of consecutive days, into one series. Where two files hold a map of the same
 * epoch, as at midnight, the one of the file that begins later is kept. A file on another grid or shell is left out
 * with a message: its values would jump against the others.
 * @throws RangeError without any maps
 */
export function joinMaps(files: readonly TecMaps[]): JoinedMaps {
  const [first] = files;
  if (first === undefined) throw new RangeError('files: expected at least one, received none');
  const messages: Message[] = [];
  const like = files.filter((maps) => hasSameGrid(maps, first));
  for (const maps of files) {
    if (like.includes(maps)) continue;
    messages.push(
      message(
        'warning',
        'map-other-grid',
        `Expected map files on one grid and shell, came maps from ${instantWords(maps.epochsMs[0]!)} on ${gridWords(maps)} beside ${gridWords(first)}. They are left out: give files of one provider.`,
      ),
    );
  }
  const inOrder = [...like].sort((a, b) => a.epochsMs[0]! - b.epochsMs[0]!);
  const byEpoch = new Map<number, { maps: TecMaps; index: number }>();
  let replaced = 0;
  for (const maps of inOrder)
    maps.epochsMs.forEach((epochMs, index) => {
      const before = byEpoch.get(epochMs);
      if (before !== undefined && !(index === 0 && before.index === before.maps.epochsMs.length - 1))
        replaced += 1;
      byEpoch.set(epochMs, { maps, index });
    });
  if (replaced > 0)
    messages.push(
      message(
        'warning',
        'map-files-overlap',
        `Expected map files of different times, came ${counted(replaced, 'epoch')} in more than one file. The map of the file that begins later is used; leave out the other.`,
      ),
    );
  const entries = [...byEpoch].sort(([a], [b]) => a - b);
  const pick = <T>(of: (maps: TecMaps) => readonly T[]): T[] =>
    entries.map(([, { maps, index }]) => of(maps)[index]!);
  return {
    maps: {
      ...first,
      epochsMs: Float64Array.from(entries, ([epochMs]) => epochMs),
      tec: pick((maps) => maps.tec),
      rms: pick((maps) => maps.rms),
      heights: pick((maps) => maps.heights),
      intervalSeconds: like.every((maps) => maps.intervalSeconds === first.intervalSeconds)
        ? first.intervalSeconds
        : 0,
    },
    messages,
  };
}

function hasSameGrid(a: TecMaps, b: TecMaps): boolean {
  const same = (x: Float64Array, y: Float64Array): boolean =>
    x.length === y.length && x.every((value, i) => Math.abs(value - y[i]!) < 1e-6);
  return (
    same(a.latitudesDeg, b.latitudesDeg) &&
    same(a.longitudesDeg, b.longitudesDeg) &&
    a.shellHeightKm === b.shellHeightKm &&
    a.baseRadiusKm === b.baseRadiusKm
  );
}

const gridWords = ({ latitudesDeg, longitudesDeg, shellHeightKm }: TecMaps): string =>
  `${latitudesDeg.length} x ${longitudesDeg.length} nodes at ${shellHeightKm} km`;

/**
 * Says which times of a study the maps do not reach; null when they reach all.
 * @param what has these times
 */
export function outsideMapsNote(
  maps: TecMaps,
  timesMs: ArrayLike<number>,
  what: 'time' | 'occupation' = 'time',
): Message | null {
  const [from, to] = [maps.epochsMs[0]!, maps.epochsMs.at(-1)!];
  const outside = Array.from(timesMs).filter((ms) => !mapsReach(maps, ms));
  if (outside.length === 0) return null;
  const known = outside.filter(Number.isFinite);
  const when =
    known.length === 0
      ? 'without a time'
      : `from ${dayWords(known.reduce((a, b) => Math.min(a, b)))} to ${dayWords(known.reduce((a, b) => Math.max(a, b)))}`;
  const share = outside.length === timesMs.length ? 'all of them' : `${outside.length} of them`;
  return message(
    'warning',
    'map-other-day',
    `Expected maps for ${counted(timesMs.length, what)}, came maps from ${instantWords(from)} to ${instantWords(to)}: ${share} lie outside or in a gap, ${when}, and have no TEC. Give the map files of these days.`,
  );
}
