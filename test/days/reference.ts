import { readFileSync } from 'node:fs';
import { expect } from 'vitest';
import type { FitData } from '../../src/fit/index.js';
import { prepareErrors } from '../../src/fit/index.js';
import type { Message } from '../../src/logs/index.js';
import { referenceErrors } from '../fit/reference.js';

const FITS = new URL('../fixtures/fits/', import.meta.url);
const DAYS = new URL('../fixtures/days/', import.meta.url);

/** A reference set as errors with starts; the hour of the day is local solar time. */
export function timedErrors(name: string) {
  const [, ...lines] = readFileSync(new URL(`${name}.csv`, FITS), 'utf8')
    .trim()
    .split('\n');
  return referenceErrors(name).map((row, i) => {
    const time = lines[i]!.split(',')[3]!;
    const startMs = Date.parse(`${row.day}T${time}Z`);
    return { ...row, startMs, solarHour: (startMs - Date.parse(`${row.day}T00:00:00Z`)) / 3_600_000 };
  });
}

/** Weights of the occupations of a reference set, in the order of its rows. */
export function referenceWeights(name: string): Float64Array {
  return Float64Array.from(JSON.parse(readFileSync(new URL('weights.json', DAYS), 'utf8'))[name]);
}

/** One axis of a reference set as vertical errors. */
export function axisData(name: string, axis: 'east' | 'north' | 'up', weights?: Float64Array): FitData {
  const rows = timedErrors(name).map((row) => ({ ...row, up: row[axis] }));
  return prepareErrors(rows, 'vertical', weights);
}

export const readDaysFixture = (name: string): Record<string, number[]> =>
  JSON.parse(readFileSync(new URL(name, DAYS), 'utf8'));

export function close(actual: number, expected: number, relative = 1e-8): void {
  expect(Math.abs(actual - expected)).toBeLessThanOrEqual(relative * Math.abs(expected));
}

export function allClose(actual: Iterable<number>, expected: readonly number[], relative = 1e-8): void {
  const list = [...actual];
  expect(list).toHaveLength(expected.length);
  for (const [k, value] of list.entries()) close(value, expected[k]!, relative);
}

/** The grammar of messages, as test/messages.test.ts holds it for a whole run. */
export function expectSentences(notes: readonly Message[]): void {
  for (const { code, text } of notes) {
    expect(code).toMatch(/^[a-z0-9]+(-[a-z0-9]+)*$/);
    expect(text).toMatch(/^[\p{Lu}\d"].*\.$/u);
    expect(text).not.toMatch(/undefined|\[object|\bNaN\b|\bnull\b|\bInfinity\b| {2}|\.\.|\s\./);
    expect(text.length).toBeLessThanOrEqual(600);
  }
}
