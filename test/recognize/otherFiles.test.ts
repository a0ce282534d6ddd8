import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { formatMessage } from '../../src/logs/index.js';
import { testFolder } from '../files.js';
import { decisive, file, readRecognized, recognize, recognized } from './heads.js';

const folder = testFolder();

const refusal = (content: string | Uint8Array): string => {
  const found = recognize(content);
  return found.kind === 'unrecognized' ? formatMessage(found.message) : 'recognised';
};

describe('files that are no logs', () => {
  it.each<[string, string | Uint8Array, RegExp]>([
    [
      'a spreadsheet',
      Uint8Array.of(0x50, 0x4b, 3, 4, 20, 0, 6, 0),
      /came a spreadsheet .*choose "Save as" and the type CSV/,
    ],
    [
      'an old spreadsheet',
      Uint8Array.of(0xd0, 0xcf, 0x11, 0xe0, 0xa1),
      /came an old binary spreadsheet.* CSV/,
    ],
    ['a PDF', '%PDF-1.7\n1 0 obj', /came a PDF\. Export the positions as text/],
    ['a compressed file', Uint8Array.of(0x1f, 0x8b, 8, 0), /came a compressed file\. Unpack it/],
    [
      'binary data',
      Uint8Array.from({ length: 3000 }, (_, k) => (k * k * 31 + 7 * k + 200) % 256),
      /came binary data/,
    ],
    ['a page', '<?xml version="1.0"?>\n<kml>1,2,3</kml>\n', /came text in a markup language/],
    ['objects', '{"mark": "CP1", "x": 1}\n', /came text in a markup language/],
    ['prose', 'Dear crew,\nplease measure the marks\nbefore noon.\n', /came text without such rows/],
    ['a table of other things', file('apples,3,4', 'pears,5,6'), /in which none were found/],
    ['nothing', '', /came an empty file\. Export it again/],
    ['blank lines', '\n\n \n', /came an empty file/],
    ['a header alone', 'time,mark,latitude,longitude,height\n', /came a header alone\. Export it again/],
    ['thousands', file('1;4,982,950.40;500,000.00;135.1;CHK'), /marks between thousands like "4,982,950.40"/],
    [
      'decimal commas between commas',
      file('Point,N,E,H', '1,4982950,40,500000,00,135,10'),
      /decimal commas cannot be told apart/,
    ],
    [
      'sentences without checksum',
      file('$GPGGA,101500.00,4700.6,N,00800.0,E,4,14,0.8,500.0,M,47.0,M,1.0,0001'),
      /came GGA sentences without one that is right/,
    ],
  ])('%s', (_, content, text) => {
    expect(refusal(content)).toMatch(/^log\.csv(:\d+)? error: Expected /);
    expect(refusal(content)).toMatch(text);
    expect(refusal(content)).toMatch(/\.$/);
  });

  it('no bytes at all make it stumble', () => {
    const seeds = [
      'time,mark,latitude\n',
      '1,2,3\n',
      '$GPGGA,',
      '\ufeff',
      ';;;\n',
      '"',
      '#\n',
      '2025-03-14 10:15\t',
    ];
    const piece = fc.oneof(fc.constantFrom(...seeds), fc.string({ maxLength: 30 }));
    fc.assert(
      fc.property(fc.array(piece, { maxLength: 20 }), (pieces) => {
        expect(['recognized', 'unrecognized']).toContain(recognize(pieces.join('')).kind);
      }),
      { seed: 5, numRuns: 500 },
    );
    fc.assert(
      fc.property(fc.uint8Array({ maxLength: 300 }), (bytes) => {
        expect(['recognized', 'unrecognized']).toContain(recognize(bytes).kind);
      }),
      { seed: 6, numRuns: 300 },
    );
  });
});

/** A sentence with its checksum, the exclusive or of its characters (NMEA 0183). */
function sentence(body: string): string {
  const sum = [...body].reduce((xor, letter) => xor ^ letter.charCodeAt(0), 0);
  return `$${body}*${sum.toString(16).toUpperCase().padStart(2, '0')}`;
}

describe('NMEA', () => {
  const gga = (second: number): string =>
    sentence(`GNGGA,10150${second}.00,4700.6000,N,00800.0000,W,4,14,0.8,453.0,M,47.0,M,1.0,0001`);
  const rmc = sentence('GNRMC,101500.00,A,4700.6000,N,00800.0000,W,0.0,0.0,140325,,,R');

  it('is known by sentences with right checksums, also behind noise', async () => {
    const noise = Buffer.from([0xff, 0xfe, 0x80, 0x01, 0x00, 0x47, 0x0a, 0x81]);
    const content = Buffer.concat([
      noise,
      Buffer.from(`boot 1.2\r\n${[rmc, gga(0), gga(1)].join('\r\n')}\r\n`),
    ]);
    const { found, log } = await readRecognized(folder, content);
    expect(found.layout).toEqual({ kind: 'nmea' });
    expect(found.preview).toHaveLength(2);
    expect(log.positions[0]).toMatchObject({ fix: 'fixed', utcMs: Date.UTC(2025, 2, 14, 10, 15) });
    // 47° 0.6', and 453 m + 47 m.
    expect(log.positions[0]!.latitudeDeg).toBeCloseTo(47.01, 10);
    expect(log.positions[0]!.longitudeDeg).toBe(-8);
    expect(log.positions[0]!.heightM).toBe(500);
  });

  it('without a date takes it from the name of the file or asks', async () => {
    const text = file(gga(0), gga(1));
    const { found, log } = await readRecognized(folder, text, {}, 'static 2025-03-14.nmea');
    expect(found.layout).toEqual({ kind: 'nmea', fromFileName: '(?<date>\\d{4}-\\d{2}-\\d{2})' });
    expect(log.positions[1]!.utcMs).toBe(Date.UTC(2025, 2, 14, 10, 15, 1));
    for (const [name, choices] of [
      ['20250314.nmea', ['2025-03-14']],
      ['static.nmea', []],
    ] as const) {
      const open = recognized(text, {}, name);
      expect(decisive(open)).toEqual(['no-date']);
      expect(open.unsure[0]!.choices).toEqual(choices);
    }
  });
});
