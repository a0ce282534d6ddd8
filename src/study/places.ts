import { type Document, isMap, isNode, isScalar, type LineCounter } from 'yaml';
import type { Place } from '../logs/index.js';

/** Keys and indices from the top of a study file to a value. */
export type Path = readonly PropertyKey[];

/** Path of a key → file, line and key, for messages. */
export type PlaceOf = (path: Path) => Place;

export function placeFunction(document: Document, lines: LineCounter, file: string): PlaceOf {
  return (path) => {
    const offset = offsetOf(document, path);
    const column = written(path);
    return {
      file,
      ...(offset === null ? {} : { row: lines.linePos(offset).line }),
      ...(column === '' ? {} : { column }),
    };
  };
}

/** `logs[0].files`. */
function written(path: Path): string {
  return path.reduce<string>((joined, step) => {
    if (typeof step === 'number') return `${joined}[${step}]`;
    return joined === '' ? String(step) : `${joined}.${String(step)}`;
  }, '');
}

/** Where the key at a path stands, or the nearest thing above it that exists. */
function offsetOf(document: Document, path: Path): number | null {
  for (let depth = path.length; depth > 0; depth--) {
    const parent = depth === 1 ? document.contents : document.getIn(path.slice(0, depth - 1), true);
    const step = path[depth - 1];
    if (isMap(parent)) {
      // YAML reads a key like 4 as a number, a path holds text.
      const pair = parent.items.find(({ key }) => isScalar(key) && String(key.value) === String(step));
      if (pair !== undefined && isNode(pair.key) && pair.key.range) return pair.key.range[0];
    }
    const node = document.getIn(path.slice(0, depth), true);
    if (isNode(node) && node.range) return node.range[0];
  }
  return null;
}
