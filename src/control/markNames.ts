import { quotedList } from '../logs/index.js';
import type { Mark } from './marks.js';

/** `mark "A"`, `marks "A", "B"`; of many the first. */
export const markNames = (marks: readonly Mark[]): string =>
  `${marks.length === 1 ? 'mark' : 'marks'} ${quotedList(marks.map(({ name }) => name))}`;

export const isAre = (marks: readonly Mark[]): string => (marks.length === 1 ? 'is' : 'are');
