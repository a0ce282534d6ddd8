import { readGga } from '../nmea/readGga.js';
import { findSentences } from '../nmea/sentence.js';
import type { HeadText } from './headText.js';
import type { PreviewRow } from './recognition.js';

const PREVIEW_ROWS = 5;

/** The first GGA sentences as they are read; their date comes from other sentences, so the time of day is a text. */
export function nmeaPreview({ lines }: HeadText): PreviewRow[] {
  const preview: PreviewRow[] = [];
  for (const { row, text } of lines) {
    for (const sentence of findSentences(text)) {
      if (sentence.kind !== 'sentence' || sentence.type !== 'GGA') continue;
      const gga = readGga(sentence.fields, row, () => {});
      const known = gga.kind === 'row' && !Number.isNaN(gga.latitudeDeg);
      preview.push({
        row,
        texts: {
          timeOfDay: sentence.fields[1] ?? '',
          fix: gga.kind === 'row' ? gga.fix : '',
          satellites: sentence.fields[7] ?? '',
        },
        time: null,
        coordinates: known
          ? { latitudeDeg: gga.latitudeDeg, longitudeDeg: gga.longitudeDeg, heightM: gga.heightM }
          : null,
      });
      if (preview.length === PREVIEW_ROWS) return preview;
    }
  }
  return preview;
}
