import { readFile } from 'node:fs/promises';
import { gunzipSync } from 'node:zlib';
import {
  type GeomagneticIndices,
  joinMaps,
  mergeIndices,
  readIndices,
  readTecMaps,
  type TecMaps,
} from '../ionosphere/index.js';
import { type Message, message } from '../logs/index.js';
import type { NamedFile } from './fileFinder.js';
import type { Study } from './study.js';

/** What the files of the sky hold, put together. */
export interface SkyFiles {
  /** Null where no file of indices could be read. */
  readonly indices: GeomagneticIndices | null;
  readonly maps: TecMaps | null;
  /** Those that were used. */
  readonly files: readonly string[];
  readonly messages: readonly Message[];
}

/** Reads the index and map files of a study. A file that cannot be read leaves a message, and the others are used. */
export async function readSkyFiles({ indices, maps }: Pick<Study, 'indices' | 'maps'>): Promise<SkyFiles> {
  const messages: Message[] = [];
  const files: string[] = [];
  const indexSets: GeomagneticIndices[] = [];
  for (const named of indices) {
    const text = await textOf(named, messages);
    if (text === null) continue;
    const reading = readIndices(text, named.file);
    messages.push(...reading.messages);
    if (reading.rowsUsed === 0) continue;
    indexSets.push(reading.indices);
    files.push(named.file);
  }
  const mapSets: TecMaps[] = [];
  for (const named of maps) {
    const text = await textOf(named, messages);
    if (text === null) continue;
    const reading = readTecMaps(text, named.file);
    messages.push(...reading.messages);
    if (reading.maps === null) continue;
    mapSets.push(reading.maps);
    files.push(named.file);
  }
  const merged = indexSets.length === 0 ? null : mergeIndices(indexSets);
  const joined = mapSets.length === 0 ? null : joinMaps(mapSets);
  messages.push(...(merged?.messages ?? []), ...(joined?.messages ?? []));
  return { indices: merged?.indices ?? null, maps: joined?.maps ?? null, files, messages };
}

/** Text of a file, unpacked where it is gzip; null, with a message, where it cannot be had. */
async function textOf({ path, file }: NamedFile, messages: Message[]): Promise<string | null> {
  const unreadable = (came: string, remedy: string): null => {
    messages.push(
      message(
        'error',
        'sky-file-unreadable',
        `Expected a file of indices or maps that can be read, came ${came}. ${remedy}`,
        { file },
      ),
    );
    return null;
  };
  try {
    const bytes = await readFile(path);
    if (bytes[0] === 0x1f && bytes[1] === 0x9d)
      return unreadable('one packed by "compress"', 'Unpack it and name the unpacked file.');
    const isGzip = bytes[0] === 0x1f && bytes[1] === 0x8b;
    return (isGzip ? gunzipSync(bytes) : bytes).toString('latin1');
  } catch (error) {
    const reason = (error as Error & { code?: string }).code ?? (error as Error).message;
    return unreadable(`one that gives the error ${reason}`, 'Get it again, or check who may read it.');
  }
}
