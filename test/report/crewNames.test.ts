import { describe, expect, it } from 'vitest';
import { crewMask } from '../../src/report/crewNames.js';

describe('crews by number', () => {
  it('stand where a sentence calls them crews, longer names first', () => {
    const mask = crewMask(['North', 'North East', 'C+']);
    expect(mask('Put down to crew "North East", not to crew North; Crew, C+.')).toBe(
      'Put down to crew 2, not to crew 1; Crew 3.',
    );
  });
  it('leave words, columns and marks of the same name alone', () => {
    const mask = crewMask(['A', 'B'], ['B', 'M 1']);
    const sentence = 'Column "B" is the latitude of mark B; crew Bly is no crew of ours.';
    expect(mask(sentence)).toBe(sentence);
  });
  it('leave the name of a file as it is', () => {
    const mask = crewMask(['B'], ['logs/crew B.csv', 'crew B']);
    expect(mask('logs/crew B.csv has 3 rows of crew B')).toBe('logs/crew B.csv has 3 rows of crew 1');
  });
  it('need no crew', () => {
    expect(crewMask([''])('crew "" is not named')).toBe('crew "" is not named');
  });
});
