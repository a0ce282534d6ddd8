import { describe, expect, it } from 'vitest';
import { formOccupations } from '../../src/errors/index.js';
import { at, batches, control } from './world.js';

const told = async (...seconds: readonly (number | [number, string])[]) => {
  const positions = seconds.map((each) =>
    typeof each === 'number' ? at(each) : at(each[0], { rover: each[1] }),
  );
  const { messages, occupations } = await formOccupations(batches(positions), control(), { timeZone: 'UTC' });
  return { codes: messages.map(({ code }) => code), texts: messages.map(({ text }) => text), occupations };
};

describe('rows that go back in time', () => {
  it('are told once a file and sorted', async () => {
    const { texts, occupations } = await told(0, 1, 4, 2, 3);
    expect(texts).toEqual([
      'Expected rows in the order of time, came 2 rows that go back: they are sorted. Look whether files were joined on purpose.',
    ]);
    expect(occupations).toHaveLength(1);
    expect(occupations[0]).toMatchObject({ epochs: 5 });
  });
  it('are nothing to tell of when rovers take turns', async () => {
    expect((await told([5, 'R1'], [1, 'R2'], [6, 'R1'], [2, 'R2'])).codes).toEqual([]);
    expect((await told([5, 'R1'], [1, 'R2'], [4, 'R1'])).codes).toEqual(['back-in-time']);
  });
});
