import { describe, expect, it } from 'vitest';
import { formOccupations } from '../../src/errors/index.js';
import { at, batches, control } from './world.js';

async function told(numbers: readonly string[]): Promise<string[]> {
  const rows = numbers.map((pointNumber, k) => at(300 * k, { pointNumber, row: k + 2 }));
  const { messages } = await formOccupations(batches(rows), control(), { timeZone: 'UTC' });
  return messages.map(({ code, severity, row, text }) => `${code} ${severity} ${row}: ${text}`);
}

const numbers = (from: number, to: number): string[] =>
  Array.from({ length: to - from + 1 }, (_, k) => `CHK ${from + k}`);

describe('gaps in point numbers', () => {
  it('are told where numbers otherwise run on', async () => {
    expect(await told([...numbers(1, 15), ...numbers(18, 30), ...numbers(32, 40)])).toEqual([
      'point-number-gaps info 17: Expected point numbers that run on, came 2 gaps with 3 numbers missing. If shots were deleted in the field, the errors look smaller than they are: keep both shots and note why one is bad.',
    ]);
    expect((await told([...numbers(1, 15), ...numbers(17, 30)]))[0]).toContain(
      'one gap with 1 number missing',
    );
  });

  it('are not told of other jobs, of few shots, or of numbers that do not run on', async () => {
    expect(await told(numbers(1, 40))).toEqual([]);
    expect(await told([...numbers(1, 20), ...numbers(1001, 1020)])).toEqual([]);
    expect(await told([...numbers(1, 5), ...numbers(7, 10)])).toEqual([]);
    expect(await told(Array.from({ length: 40 }, (_, k) => `${3 * k}`))).toEqual([]);
    expect(await told(Array(30).fill('CP1'))).toEqual([]);
  });
});
