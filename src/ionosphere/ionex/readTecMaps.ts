import { type Message, message } from '../../logs/index.js';
import { IonexFault } from './fault.js';
import { type IonexHeader, readHeader } from './header.js';
import { LineCursor } from './lineCursor.js';
import { type MapBlock, type MapKind, readMapBlock } from './mapBlock.js';
import { mapNotes } from './mapNotes.js';
import type { TecMaps } from './tecMaps.js';

/** What the text of a map file holds. */
export interface TecMapsReading {
  /** Null when no map of TEC could be read; the messages say why. */
  readonly maps: TecMaps | null;
  readonly messages: readonly Message[];
}

/**
 * Reads the text of a file of ionosphere maps in the IONEX format 1.0 or 1.1 (Schaer, Gurtner & Feltens 1998): maps of
 * TEC, of its root-mean-square error and of heights, on one shell. Of a file that breaks off or is damaged, the whole
 * maps before the damage are kept, and a message with the line says what is lost.
 * @param file its name in messages
 */
export function readTecMaps(text: string, file: string): TecMapsReading {
  const cursor = new LineCursor(text);
  const messages: Message[] = [];
  const blocks: MapBlock[] = [];
  let header: IonexHeader | null = null;
  try {
    header = readHeader(cursor);
    readBlocks(cursor, header, blocks);
  } catch (error) {
    if (!(error instanceof IonexFault)) throw error;
    const kept = blocks.filter(({ kind }) => kind === 'TEC').length;
    const place = { file, ...(error.line === null ? {} : { row: error.line }) };
    const text = [error.message, ...keptWords(kept)].join(' ');
    messages.push(message(kept === 0 ? 'error' : 'warning', error.code, text, place));
  }
  if (header === null) return { maps: null, messages };
  const tec = lastOfEach(blocks, 'TEC');
  if (tec.length === 0) {
    if (messages.length === 0)
      messages.push(
        message(
          'error',
          'map-none',
          'Expected at least one map of TEC, came a file with none. Give another file.',
          { file },
        ),
      );
    return { maps: null, messages };
  }
  messages.push(...mapNotes(header, blocks, tec, file));
  const matching = (kind: MapKind): (Float64Array | null)[] => {
    const others = new Map(blocks.filter((one) => one.kind === kind).map((one) => [one.epochMs, one.values]));
    return tec.map(({ epochMs }) => others.get(epochMs) ?? null);
  };
  return {
    maps: {
      system: header.system,
      epochsMs: Float64Array.from(tec, ({ epochMs }) => epochMs),
      latitudesDeg: header.latitudesDeg,
      longitudesDeg: header.longitudesDeg,
      shellHeightKm: header.shellHeightKm,
      baseRadiusKm: header.baseRadiusKm,
      tec: tec.map(({ values }) => values),
      rms: matching('RMS'),
      heights: matching('HEIGHT'),
      mappingFunction: header.mappingFunction,
      elevationCutoffDeg: header.elevationCutoffDeg,
      intervalSeconds: header.intervalSeconds,
    },
    messages,
  };
}

function keptWords(kept: number): string[] {
  if (kept === 0) return [];
  return [
    kept === 1 ? 'The one map of TEC before it is used.' : `The ${kept} maps of TEC before it are used.`,
  ];
}

/** Maps until END OF FILE. An exponent that a map states holds from there on. */
function readBlocks(cursor: LineCursor, header: IonexHeader, blocks: MapBlock[]): void {
  let { exponent } = header;
  for (;;) {
    if (!cursor.next())
      throw new IonexFault(
        'map-file-truncated',
        cursor.line,
        'Expected "END OF FILE", came the end of the text. Get the file again if maps are missing.',
      );
    const label = cursor.label();
    if (label === 'END OF FILE') return;
    const kind = /^START OF (TEC|RMS|HEIGHT) MAP$/.exec(label)?.[1] as MapKind | undefined;
    if (kind !== undefined) {
      const block = readMapBlock(cursor, kind, header, exponent);
      exponent = block.exponent;
      blocks.push(block);
    } else if (label !== 'COMMENT' && cursor.columns(0, 80).trim() !== '')
      throw new IonexFault(
        'map-row-unreadable',
        cursor.line,
        `Expected the start of a map or "END OF FILE", came ${JSON.stringify(cursor.columns(0, 80).trim().slice(0, 60))}. Get the file again.`,
      );
  }
}

/** Maps of one kind in the order of their epochs; of two with the same epoch the last one. */
function lastOfEach(blocks: readonly MapBlock[], kind: MapKind): MapBlock[] {
  const byEpoch = new Map(blocks.filter((one) => one.kind === kind).map((one) => [one.epochMs, one]));
  return [...byEpoch.values()].sort((a, b) => a.epochMs - b.epochMs);
}
