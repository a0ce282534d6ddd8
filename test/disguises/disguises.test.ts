import { cpSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { readStudy, readStudyErrors } from '../../src/study/index.js';
import { testFolder } from '../files.js';
import { DISGUISES, type Disguise, studyText, toleranceMm } from './disguises.js';

/*
 * One study written in nine disguises by code that is not ours (see fixtures/disguises/README.md): each gives the same
 * occupations and, as finely as it is written, the same errors.
 */

const fixtures = fileURLToPath(new URL('../fixtures/disguises', import.meta.url));
const folder = testFolder();
cpSync(fixtures, folder.path, { recursive: true });

interface Expected {
  readonly mark: string;
  readonly day: string;
  readonly startMs: number;
  readonly epochs: number;
  readonly east: number;
  readonly north: number;
  readonly up: number;
}

const EXPECTED: readonly Expected[] = readFileSync(`${fixtures}/expected.csv`, 'utf8')
  .trim()
  .split('\n')
  .slice(1)
  .map((line) => {
    const [mark, day, start, epochs, east, north, up] = line.split(',') as [string, string, ...string[]];
    return {
      mark,
      day,
      startMs: Date.parse(start!),
      epochs: Number(epochs),
      east: Number(east),
      north: Number(north),
      up: Number(up),
    };
  });

/** Occupations without a time of day come in no order of their own: both sides are put in that of day, mark and up. */
function sorted<T extends { day: string; mark: string; up: number }>(list: readonly T[]): T[] {
  const compare = (a: string, b: string): number => (a < b ? -1 : a > b ? 1 : 0);
  return [...list].sort((a, b) => compare(a.day, b.day) || compare(a.mark, b.mark) || a.up - b.up);
}

async function run(disguise: Disguise, k: number) {
  const file = folder.write(`study-${k}.yaml`, studyText(disguise));
  return readStudyErrors(await readStudy(file));
}

describe('one study', () => {
  it('has fourteen occupations on three days', () => {
    expect(EXPECTED).toHaveLength(14);
    expect(new Set(EXPECTED.map(({ day }) => day)).size).toBe(3);
  });

  it.each(DISGUISES.map((disguise, k) => [disguise.name, disguise, k] as const))(
    'as %s gives the same occupations and errors',
    async (_, disguise, k) => {
      const { errors, setAside, visits, results } = await run(disguise, k);
      expect(setAside).toEqual([]);
      const { dated = false, averaged = false, rows } = disguise;
      const [came, wanted] = dated ? [sorted(errors), sorted(EXPECTED)] : [errors, EXPECTED];
      expect(came.map(({ mark, day }) => [mark, day])).toEqual(wanted.map(({ mark, day }) => [mark, day]));
      const startOf = ({ startMs }: { startMs: number }) => (dated ? Number.NaN : startMs);
      expect(came.map(({ startMs }) => startMs)).toEqual(wanted.map(startOf));
      if (!dated) expect(came.map(({ epochs }) => epochs)).toEqual(wanted.map(({ epochs }) => epochs));

      const tolerance = toleranceMm(disguise);
      // What is asked for: 0.1 mm, or what the written decimals allow.
      expect(Math.max(tolerance.plan, tolerance.height)).toBeLessThan(
        Math.max(0.1, disguise.planStepMm, disguise.heightStepMm),
      );
      came.forEach((error, i) => {
        const truth = wanted[i]!;
        expect(Math.abs(error.east - truth.east)).toBeLessThan(tolerance.plan);
        expect(Math.abs(error.north - truth.north)).toBeLessThan(tolerance.plan);
        expect(Math.abs(error.up - truth.up)).toBeLessThan(tolerance.height);
        if (averaged) expect(error.scatterEastMm).toBeNaN();
      });

      expect(results.rows).toEqual(rows);
      const withoutFix = visits.filter(({ fixedRows }) => fixedRows === 0);
      // A point list holds no shots without a fix.
      expect(withoutFix.map(({ mark }) => mark)).toEqual(dated ? [] : ['CP12']);
    },
  );
});
