import { type Message, message } from '../../logs/index.js';
import { counted, instantWords } from '../words.js';
import { type GeomagneticIndices, INDEX_NAMES, INDEX_STATUSES, INDEX_WORDS } from './indexSeries.js';
import { SeriesBuilder } from './seriesBuilder.js';

/** Indices out of several files, and what the files say differently. */
export interface MergedIndices {
  readonly indices: GeomagneticIndices;
  readonly messages: readonly Message[];
}

/**
 * Puts the indices of several files together. Where two hold a value for the same interval, the more final one is kept,
 * else the one of the later file; values that differ are counted in a message.
 */
export function mergeIndices(files: readonly GeomagneticIndices[]): MergedIndices {
  const builder = new SeriesBuilder();
  for (const { series } of files)
    for (const name of INDEX_NAMES) {
      const one = series[name];
      if (one === undefined) continue;
      for (let i = 0; i < one.startMs.length; i++)
        builder.add(name, one.startMs[i]!, one.values[i]!, INDEX_STATUSES[one.status[i]!]!);
    }
  const { series, conflicts } = builder.build();
  const [first] = conflicts;
  if (first === undefined) return { indices: { series }, messages: [] };
  return {
    indices: { series },
    messages: [
      message(
        'warning',
        'index-files-differ',
        `Expected index files that agree, came ${counted(conflicts.length, 'interval')} with two values, the first ${INDEX_WORDS[first.name]} at ${instantWords(first.startMs)}: ${first.kept} is kept, ${first.dropped} is not. The more final value is kept, else that of the later file; leave out the file that is out of date.`,
      ),
    ],
  };
}
