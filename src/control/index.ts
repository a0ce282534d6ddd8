export { type Base, type Bases, type Mounting, readBases } from './bases.js';
export { type Control, type Match, markFrame, matchBase, matchMark } from './control.js';
export { type Mark, type Marks, readMarks } from './marks.js';
export type { ControlFile } from './readControl.js';
