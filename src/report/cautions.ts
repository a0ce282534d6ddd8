import { percent } from './format.js';
import type { Page } from './page.js';

/** Printed with every result. */
export const CAUTIONS: readonly string[] = [
  'The rule holds for positions that the receiver called fixed, at the sites, seasons, receivers, crews and procedures in the data, and for nothing else.',
  'It is no substitute for redundant checks, for local codes, for the accuracy standards of clients and of the law, or for the judgement of a licensed surveyor.',
  'Positions that the safety of people hangs on need independent verification.',
];

/** What a reader must know of how the numbers of this study were found. */
export function limitsOfStudy({ results }: Page): string[] {
  const { fits, rules } = results;
  const basis = fits.filter(({ basisOfRule }) => basisOfRule);
  return [
    ...(basis.some(({ screened }) => !screened)
      ? [
          'Positions that were called fixed with wrong ambiguities were not looked for: a few of them make constant and ppm larger.',
        ]
      : []),
    ...(basis.some(({ reference }) => reference === 'absolute')
      ? [
          'Errors of the coordinates of marks are part of the errors: with few marks, or poor coordinates, they pass for ppm.',
        ]
      : []),
    ...(basis.some(({ reference }) => reference === 'repeatability')
      ? [
          'The rule says how well a position is found again. What the base’s own coordinates are off by is the same on all positions and must be added.',
        ]
      : []),
    ...unseenDays(rules[0]?.conditions.days ?? 0),
  ];
}

/** Days worse than all those observed may have been missed: with none among G, they are at most about 3/G (95 %). */
export const unseenShare = (days: number): number => Math.min(1, 3 / days);

function unseenDays(days: number): string[] {
  if (days === 0) return [];
  return [
    `All of this is said of the days observed. Days worse than any of these may be as many as ${percent(unseenShare(days))} without one having been met.`,
  ];
}
