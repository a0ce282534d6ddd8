import { readFileSync } from 'node:fs';

const FOLDER = new URL('../fixtures/fits/', import.meta.url);

export interface ReferenceRow {
  day: string;
  base: string;
  mark: string;
  setup: string;
  startMs: number;
  baselineKm: number;
  east: number;
  north: number;
  up: number;
}

/** Rows of a reference data set under the names this library uses. */
export function referenceErrors(name: string): ReferenceRow[] {
  const [, ...lines] = readFileSync(new URL(`${name}.csv`, FOLDER), 'utf8')
    .trim()
    .split('\n');
  return lines.map((line) => {
    const [day, base, mark, time, km, east, north, up] = line.split(',') as [
      string,
      string,
      string,
      string,
      string,
      string,
      string,
      string,
    ];
    return {
      day,
      base,
      mark,
      setup: `${day} ${base}`,
      startMs: Date.parse(`${day}T${time}Z`),
      baselineKm: Number(km),
      east: Number(east),
      north: Number(north),
      up: Number(up),
    };
  });
}

// biome-ignore lint/suspicious/noExplicitAny: the file holds whatever R wrote, and tests name the fields
export function referenceFits(name: string): any {
  return JSON.parse(readFileSync(new URL(`${name}.json`, FOLDER), 'utf8')).reference;
}

/** Rows, from 1, that the generator of a data set spoilt by a wrong fix. */
export function referenceWrongFixes(name: string): readonly number[] {
  return JSON.parse(readFileSync(new URL(`${name}.json`, FOLDER), 'utf8')).truth.wrong_fix_rows_1based;
}
