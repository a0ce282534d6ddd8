import { type Message, message } from '../messages.js';

interface Signature {
  readonly bytes: readonly number[];
  readonly code: string;
  readonly text: string;
}

const ascii = (text: string): number[] => [...text].map((letter) => letter.charCodeAt(0));
const SAVE_AS_CSV =
  'Open it in the spreadsheet program, choose "Save as" and the type CSV, and name that file.';

/** Kinds of file that start with bytes of their own (file signatures as published with each format). */
const SIGNATURES: readonly Signature[] = [
  {
    bytes: [0x50, 0x4b, 0x03, 0x04],
    code: 'spreadsheet',
    text: `Expected delimited text, came a spreadsheet or another ZIP archive. ${SAVE_AS_CSV} Unpack it if it is an archive.`,
  },
  {
    bytes: [0xd0, 0xcf, 0x11, 0xe0],
    code: 'spreadsheet',
    text: `Expected delimited text, came an old binary spreadsheet or document. ${SAVE_AS_CSV}`,
  },
  {
    bytes: ascii('%PDF-'),
    code: 'not-text',
    text: 'Expected delimited text, came a PDF. Export the positions as text (CSV) and name that file.',
  },
  {
    bytes: [0x1f, 0x8b],
    code: 'not-text',
    text: 'Expected delimited text, came a compressed file. Unpack it and name the file inside.',
  },
];

/** Why a file is no text, by its first bytes; null when they are none of a known kind. */
export function signatureMessage(head: Buffer, file: string): Message | null {
  const found = SIGNATURES.find(({ bytes }) => bytes.every((byte, k) => head[k] === byte));
  return found === undefined ? null : message('error', found.code, found.text, { file });
}

/** Control characters that text does not hold; one stray one is a damaged row, not a binary file. */
// biome-ignore lint/suspicious/noControlCharactersInRegex: these are the ones to be found
const CONTROL = /[\u0000-\u0008\u000e-\u0019\u001b-\u001f\ufffd]/g;
const MOST_CONTROL_SHARE = 0.005;

/** Why decoded text is no list of positions: binary data or a markup language; null when it may be one. */
export function contentMessage(text: string, file: string): Message | null {
  const control = text.match(CONTROL)?.length ?? 0;
  if (control > MOST_CONTROL_SHARE * text.length) {
    return message(
      'error',
      'not-text',
      'Expected delimited text, came binary data. Export the positions as text (CSV) and name that file.',
      { file },
    );
  }
  if (/^\s*(<[?!a-z]|[[{]\s*["{])/i.test(text)) {
    return message(
      'error',
      'not-delimited',
      'Expected delimited text, came text in a markup language. Export the positions as CSV and name that file.',
      { file },
    );
  }
  return null;
}
