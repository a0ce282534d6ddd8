import { Document, isMap, isScalar, type Pair, type YAMLMap } from 'yaml';
import type { Doubt, RecognizedLog } from './recognition.js';

const COMMENT_WIDTH = 100;

type Tree = { [key: string]: unknown };

/**
 * The entry of a log in a study file (`logs:` and below) as YAML. Every column with a role is listed, so that a wrong role
 * is seen where it is mended. Doubts stand as comments at the keys they concern; a
 * key that must be stated has no value yet, so that a study file with it is refused until it is filled in.
 */
export function layoutYaml(recognition: RecognizedLog): string {
  const { file, coordinates, columns, unsure } = recognition;
  const isListed = Object.keys(columns).length > 0;
  const layout = { ...structuredClone(recognition.layout), ...(isListed ? { columns: { ...columns } } : {}) };
  const entry: Tree = { files: file, coordinates, layout };
  if (coordinates === null && !unsure.some(({ key }) => key === 'coordinates')) delete entry.coordinates;
  for (const { key, decisive } of unsure) if (decisive) leaveOpen(entry, key);
  const document = new Document({ logs: [entry] });
  const map = document.getIn(['logs', 0], true) as YAMLMap;
  // The comment at a key holds everything that concerns it.
  for (const doubt of unsure) comment(map, pathOf(doubt.key), commentText(doubt));
  return document.toString({ nullStr: '', lineWidth: 0 });
}

const pathOf = (key: string): readonly string[] => key.split('.');

/** Keys whose value the user gives as a whole, or that stand outside the entry of the log. */
const NOT_LEFT_OPEN = new Set(['layout', 'layout.columns', 'heights.kind']);

function leaveOpen(entry: Tree, key: string): void {
  if (NOT_LEFT_OPEN.has(key)) return;
  const path = pathOf(key);
  let at = entry;
  for (const step of path.slice(0, -1)) {
    if (typeof at[step] !== 'object' || at[step] === null) at[step] = {};
    at = at[step] as Tree;
  }
  at[path.at(-1)!] ??= null;
}

/** Puts a comment above the pair of a path, or of the nearest thing above it that exists. */
function comment(map: YAMLMap, path: readonly string[], text: string): void {
  let found: Pair | null = null;
  let at: unknown = map;
  for (const step of path) {
    const pair: Pair | undefined = isMap(at)
      ? at.items.find(({ key }) => isScalar(key) && key.value === step)
      : undefined;
    if (pair === undefined) break;
    found = pair;
    at = pair.value;
  }
  const target = found === null ? map.items[0]! : found;
  if (!isScalar(target.key)) return;
  const before = target.key.commentBefore;
  target.key.commentBefore = before ? `${before}\n${text}` : text;
}

function commentText({ question, because, key, choices, decisive }: Doubt): string {
  const choice = choices.length === 0 ? '' : ` State ${choices.join(' or ')}.`;
  const lead = decisive ? `TO STATE (${key}):` : 'CHECK:';
  return wrapped(`${lead} ${question} ${because}${decisive ? choice : ''}`)
    .map((line) => ` ${line}`)
    .join('\n');
}

function wrapped(text: string): string[] {
  const lines = [''];
  for (const word of text.split(' ')) {
    const line = lines.at(-1)!;
    if (line !== '' && line.length + word.length >= COMMENT_WIDTH) lines.push(word);
    else lines[lines.length - 1] = line === '' ? word : `${line} ${word}`;
  }
  return lines;
}
