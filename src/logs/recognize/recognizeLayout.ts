import { message } from '../messages.js';
import { headText } from './headText.js';
import { nmeaHead, nmeaLayout } from './nmeaHead.js';
import { nmeaPreview } from './nmeaPreview.js';
import { contentMessage, signatureMessage } from './otherFiles.js';
import type { Recognition, RecognizeOptions } from './recognition.js';
import { recognizeDelimited } from './recognizeDelimited.js';

/**
 * Recognises the layout of an exported log by its first bytes. What the bytes do not decide is asked for in doubts; what
 * would make numbers wrong if it were guessed is never guessed.
 * @param head first bytes of the file, about 64 KiB
 * @param fileName may hold the date; a path is used by its last part
 * @throws Error when `options.coordinates` is no coordinate system
 */
export function recognizeLayout(head: Buffer, fileName: string, options: RecognizeOptions = {}): Recognition {
  const signature = signatureMessage(head, fileName);
  if (signature !== null) return { kind: 'unrecognized', message: signature, unsure: [] };
  // Sentences are plain characters, and noise in front of them must not decide how bytes become text.
  const sentences = headText(head, 'utf-8');
  const nmea = nmeaHead(sentences);
  if (nmea.kind === 'nmea') {
    const { layout, doubts } = nmeaLayout(nmea, fileName);
    const complete = !doubts.some(({ decisive }) => decisive);
    const preview = nmeaPreview(sentences);
    return {
      kind: 'recognized',
      file: fileName,
      layout,
      columns: {},
      coordinates: 'geographic',
      preview,
      unsure: doubts,
      complete,
    };
  }
  if (nmea.kind === 'damaged') {
    const told = message(
      'error',
      'damaged-nmea',
      'Expected NMEA sentences with right checksums, came GGA sentences without one that is right. Log the sentences again as the receiver sends them.',
      { file: fileName },
    );
    return { kind: 'unrecognized', message: told, unsure: [] };
  }
  const text = headText(head);
  const other = contentMessage(text.text, fileName);
  if (other !== null) return { kind: 'unrecognized', message: other, unsure: [] };
  return recognizeDelimited(text, fileName, options);
}
