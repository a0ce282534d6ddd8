import { formatMessage } from '../messages.js';
import { layoutYaml } from './layoutYaml.js';
import type { Doubt, PreviewRow, Recognition } from './recognition.js';

/**
 * A recognition for the terminal: the layout as YAML, the first rows as understood, and what is not sure with the key
 * to state.
 */
export function recognitionText(recognition: Recognition, fileName: string): string {
  if (recognition.kind === 'unrecognized') return printable(`${formatMessage(recognition.message)}\n`);
  const { preview, unsure } = recognition;
  const decisive = unsure.filter((doubt) => doubt.decisive);
  const others = unsure.filter((doubt) => !doubt.decisive);
  const verdict =
    decisive.length === 0
      ? 'the layout is recognised and complete'
      : `${decisive.length} ${decisive.length === 1 ? 'thing' : 'things'} must be stated`;
  const parts = [
    `${fileName}: ${verdict}.`,
    layoutYaml(recognition).trimEnd(),
    [
      'The first rows as understood (times in UTC, degrees, heights in metres):',
      ...previewLines(preview),
    ].join('\n'),
    ...(decisive.length === 0 ? [] : [['To be stated:', ...decisive.flatMap(doubtLines)].join('\n')]),
    ...(others.length === 0 ? [] : [['To be checked:', ...others.flatMap(doubtLines)].join('\n')]),
  ];
  return printable(`${parts.join('\n\n')}\n`);
}

/** Without control characters that a terminal would obey. */
const printable = (text: string): string => text.replace(/[^\P{Cc}\n]/gu, '\ufffd');

function doubtLines({ question, because, key, choices }: Doubt): string[] {
  const choice = choices.length === 0 ? '' : `: ${choices.join(' or ')}`;
  return [`  ${question} ${because}`, `    ${key}${choice}`];
}

const ABSENT = '–';

/** The rows in columns: what was read of time and coordinates, then the cells by role. */
function previewLines(preview: readonly PreviewRow[]): string[] {
  const roles = [
    ...new Set(preview.flatMap(({ texts }) => Object.keys(texts))),
  ] as (keyof PreviewRow['texts'])[];
  const head = ['line', 'time read', 'latitude read', 'longitude read', 'height read', ...roles];
  const rows = preview.map(({ row, time, coordinates, texts }) => [
    String(row),
    time ?? ABSENT,
    coordinates === null ? ABSENT : coordinates.latitudeDeg.toFixed(8),
    coordinates === null ? ABSENT : coordinates.longitudeDeg.toFixed(8),
    coordinates === null || Number.isNaN(coordinates.heightM) ? ABSENT : coordinates.heightM.toFixed(3),
    ...roles.map((role) => texts[role] || ABSENT),
  ]);
  const widths = head.map((_, k) => Math.max(...[head, ...rows].map((cells) => [...cells[k]!].length)));
  return [head, ...rows].map((cells) =>
    `  ${cells.map((cell, k) => cell + ' '.repeat(widths[k]! - [...cell].length)).join('  ')}`.trimEnd(),
  );
}
