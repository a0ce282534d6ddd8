import { type LocalFrame, localFrame } from '../geodesy/index.js';
import { DID_YOU_MEAN, nearestName, quoted } from '../logs/index.js';
import type { Base, Bases } from './bases.js';
import type { Mark, Marks } from './marks.js';
import type { MarkTimes } from './markTimes.js';
import type { NameRules } from './names.js';

/** Everything that is known beforehand: marks and bases. */
export interface Control {
  readonly marks: Marks;
  readonly bases: Bases;
  /** How logs name marks; without it names are taken as they stand. */
  readonly names?: NameRules | undefined;
  /** Log → stays on marks, for logs whose rows name none. */
  readonly markTimes?: ReadonlyMap<string, MarkTimes> | undefined;
}

/** The point named, or what to tell about a name that is not known. */
export type Match<Point> =
  | { readonly kind: 'known'; readonly point: Point }
  | { readonly kind: 'unknown'; readonly detail: string };

/**
 * The mark of that name; unknown names come back with the nearest known one.
 * @param written the text out of which a pattern read the name
 */
export function matchMark(control: Control, name: string, written = name): Match<Mark> {
  const mark = control.marks.get(name);
  if (mark !== undefined) return { kind: 'known', point: mark };
  if (name === '') return { kind: 'unknown', detail: 'the row names no mark' };
  if (written !== name) return { kind: 'unknown', detail: misreadName(name, written, control.marks.keys()) };
  return { kind: 'unknown', detail: unknownName('mark', name, control.marks.keys()) };
}

/** The base of that name. A blank name means the only base; with several bases it cannot be known. */
export function matchBase(control: Control, name: string): Match<Base> {
  const { bases } = control;
  if (name === '') {
    if (bases.size === 1) return { kind: 'known', point: bases.values().next().value! };
    return { kind: 'unknown', detail: `the row names no base and the study has ${bases.size}` };
  }
  const base = bases.get(name);
  if (base !== undefined) return { kind: 'known', point: base };
  return { kind: 'unknown', detail: unknownName('base', name, bases.keys()) };
}

/** Of a name that the pattern under marks.names read out of a text. */
function misreadName(name: string, written: string, known: Iterable<string>): string {
  const names = [...known];
  const nearWord = (): string | null => {
    const words = written.split(/[\s,;:/]+/).filter((word) => /\d/.test(word));
    return words.map((word) => nearestName(word, names)).find((found) => found !== null) ?? null;
  };
  const near = names.find((each) => holdsWord(written, each)) ?? nearestName(name, names) ?? nearWord();
  const meant = near === null ? '' : ` (${DID_YOU_MEAN} ${quoted(near)}?)`;
  return `no mark is named ${quoted(name)}, which the pattern under marks.names reads out of ${quoted(written)}${meant}`;
}

function unknownName(what: string, name: string, known: Iterable<string>): string {
  const names = [...known];
  const within = names.find((each) => holdsWord(name, each));
  if (within !== undefined) {
    return `no ${what} is named ${quoted(name)} (${DID_YOU_MEAN} ${quoted(within)}? A pattern under marks.names reads it out of such texts)`;
  }
  const near = nearestName(name, names);
  return `no ${what} is named ${quoted(name)}${near === null ? '' : ` (${DID_YOU_MEAN} ${quoted(near)}?)`}`;
}

/** Whether a name stands in a longer text as a word of its own. */
function holdsWord(text: string, name: string): boolean {
  const at = name === '' ? -1 : text.indexOf(name);
  if (at < 0 || text.length === name.length) return false;
  const isWord = (character: string | undefined): boolean =>
    character !== undefined && /[\p{L}\p{N}]/u.test(character);
  return !isWord(text[at - 1]) && !isWord(text[at + name.length]);
}

/**
 * The local frame in which the epochs at a mark are averaged: at the mark, with what is not known of it taken from the
 * base. Averages do not depend on the frame; errors are only stated in it for what is known of the mark.
 */
export function markFrame(mark: Mark, base: Base): LocalFrame {
  const { latitudeDeg, longitudeDeg, heightM } = mark.position;
  const known = (value: number, otherwise: number): number => (Number.isNaN(value) ? otherwise : value);
  return localFrame({
    latitudeDeg: known(latitudeDeg, base.position.latitudeDeg),
    longitudeDeg: known(longitudeDeg, base.position.longitudeDeg),
    heightM: known(heightM, base.position.heightM),
  });
}
