import type { Html } from './html.js';

/** What the words of the report mean. */
const GLOSSARY: readonly (readonly [word: string, meaning: string])[] = [
  ['base', 'the point on which the base receiver runs; distances are counted from it'],
  ['baseline', 'the straight line from base to rover, and its length'],
  ['mark', 'a point with known coordinates'],
  ['visit', "a crew's stay at a mark, with or without a fix"],
  ['occupation', 'consecutive fixed positions of one visit, averaged; the unit that is analysed'],
  ['error', 'measured minus known'],
  ['ellipsoidal height', 'height above the ellipsoid of the reference frame, which satellites give'],
  [
    'orthometric height',
    'height above the geoid, about sea level: ellipsoidal height minus geoid separation',
  ],
  [
    'combined factor',
    'length on the grid over length on the ground: point scale of the projection times height factor',
  ],
  ['constant', 'the part of the spread that does not depend on distance'],
  ['ppm', 'the part that grows with distance: one part in a million, 1 mm per km'],
  ['radial RMS', 'root of the mean of east² + north²; about 63 % of positions are within it'],
  ['vertical RMS', 'root of the mean of up²; about 68 % of positions are within it'],
  ['root-sum-square', 'constant and ppm part are added as squares: spread² = constant² + (ppm × distance)²'],
  ['linear-sum', 'constant and ppm part are added as they are: spread = constant + ppm × distance'],
  [
    'repeatability',
    "errors counted from the mean of the mark's other days: how well a position is found again",
  ],
  ['setup', 'one uninterrupted run of the base receiver on a base'],
  ['wrong fix', 'a position called fixed whose whole numbers of waves are wrong'],
  ['daily factor', "a day's ppm over that of the median day"],
  ['degraded day', 'a day on which errors grow with distance clearly more than on the others'],
  ['solar time', 'local mean solar time: the sun is highest at about 12:00'],
  ['tolerance', 'a limit and the share of positions that must be within it'],
  [
    'maximum baseline',
    'the distance from the base up to which a tolerance holds, with the stated confidence',
  ],
];

/** Those words that a page uses, in one number or the other; pictures are no words. */
export function wordsUsed(parts: readonly Html[]): typeof GLOSSARY {
  const words = parts.map(({ text }) => text.replace(/<[^>]*>/g, ' ')).join(' ');
  return GLOSSARY.filter(([word]) => new RegExp(`\\b${word}(s|es)?\\b`, 'i').test(words));
}
