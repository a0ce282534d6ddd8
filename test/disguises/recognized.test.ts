import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { recognizeLayout } from '../../src/logs/index.js';

const FOLDER = new URL('../fixtures/disguises/', import.meta.url);
const recognise = (name: string, coordinates?: string) =>
  recognizeLayout(readFileSync(new URL(name, FOLDER)), name, { timeZone: 'Atlantic/Azores', coordinates });

describe('the nine disguises are recognised with nothing stated but the zone of the study', () => {
  it.each(['a.csv', 'b.txt', 'd.tsv', 'e.txt', 'f.nmea', 'g.csv', 'h.csv'])('%s is complete', (name) => {
    expect(recognise(name)).toMatchObject({ kind: 'recognized', complete: true });
  });
  it.each([
    ['c.csv', ['projection', 'which-foot', 'height-of']],
    ['points_2025-03-29.txt', ['projection', 'northing-easting-order', 'mark-column']],
  ])('%s says what it lacks', (name, lacks) => {
    const recognition = recognise(name);
    const decisive = recognition.unsure.filter((doubt) => doubt.decisive);
    expect(recognition).toMatchObject({ kind: 'recognized', complete: false });
    expect(decisive.map(({ code }) => code).sort()).toEqual([...lacks].sort());
    for (const { question, because, key } of decisive) {
      expect(question).toMatch(/\?$/);
      expect(because).not.toBe('');
      expect(key).not.toBe('');
    }
  });
});
