import { describe, expect, it } from 'vitest';
import { nearestName, suggestion } from '../../src/logs/index.js';

describe('nearestName', () => {
  const known = ['CP5', 'CP12', 'PILLAR', '007', 'Quarry north'];
  it.each<[string, string | null]>([
    ['CP-5', 'CP5'],
    ['cp5', 'CP5'],
    ['CP 12', 'CP12'],
    ['CP21', 'CP12'],
    ['PILAR', 'PILLAR'],
    ['PILRLA', 'PILLAR'],
    ['quarry_north', 'Quarry north'],
    ['7', '007'],
    ['CP-05', 'CP5'],
    ['CP012', 'CP12'],
    ['CP102', 'CP12'],
    ['8', null],
    ['0007', '007'],
    ['TREE', null],
    ['', null],
    ['5', null],
    ['x'.repeat(1_000_000), null],
  ])('%.20s', (name, near) => {
    expect(nearestName(name, known)).toBe(near);
  });

  it('prefers the same name in other writing to a name that differs in a letter', () => {
    expect(nearestName('CP-5', ['CP6', 'CP5', 'CP7'])).toBe('CP5');
  });

  it('asks a question, or nothing', () => {
    expect(suggestion('titel', ['title', 'timeZone'])).toBe(' Did you mean "title"?');
    expect(suggestion('colour', ['title'])).toBe('');
  });
});
