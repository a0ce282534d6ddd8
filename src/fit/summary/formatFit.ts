import { formatMessage } from '../../logs/index.js';
import type { ErrorModel } from '../errorModel.js';
import type { FitComponent } from '../forms.js';
import type { Coefficient } from './coefficientTable.js';
import { type FitExtras, fitSummary, percent } from './fitSummary.js';

/** Stands for a value that the data cannot defend; a note says why. */
const NOT_GIVEN = '—';
const WIDEST = 100;

/** A fit as text for a terminal or a notebook: what it is, its numbers, what they mean, and its notes. */
export function formatFit(model: ErrorModel<FitComponent>, extras: FitExtras = {}): string {
  const { title, facts, confidence, coefficients, remarks, notes } = fitSummary(model, extras);
  const width = Math.max(...facts.map(([word]) => word.length)) + 2;
  return [
    title,
    '',
    ...facts.map(([word, text]) => wrapped(word.padEnd(width), text, width)),
    '',
    ...tableLines(coefficients, confidence),
    '',
    ...remarks.map((remark) => wrapped('', remark, 0)),
    ...(notes.length === 0 ? [] : ['', 'Notes']),
    ...notes.map((note) => wrapped('- ', formatMessage(note), 2)),
  ].join('\n');
}

/** A coefficient as texts: estimate and limits, with the decimals of its unit. */
export function coefficientTexts({ unit, estimate, low, high }: Coefficient): {
  readonly estimate: string;
  readonly limits: string;
} {
  const decimals = unit === 'mm per km' ? 2 : 1;
  const text = (value: number | null): string => (value === null ? NOT_GIVEN : value.toFixed(decimals));
  if (estimate === null && high !== null) return { estimate: NOT_GIVEN, limits: `below ${text(high)}` };
  return {
    estimate: text(estimate),
    limits: low === null || high === null ? NOT_GIVEN : `${text(low)} to ${text(high)}`,
  };
}

function tableLines(coefficients: readonly Coefficient[], confidence: number): string[] {
  const rows = coefficients.map((coefficient) => {
    const { estimate, limits } = coefficientTexts(coefficient);
    return [`${coefficient.name}, ${coefficient.unit}`, estimate, limits];
  });
  const all = [['', 'estimate', `${percent(confidence)} interval`], ...rows];
  const widths = [0, 1, 2].map((k) => Math.max(...all.map((row) => row[k]!.length)));
  return all.map(([name, estimate, limits]) =>
    `${name!.padEnd(widths[0]!)}  ${estimate!.padStart(widths[1]!)}  ${limits!.padStart(widths[2]!)}`.trimEnd(),
  );
}

/** Lines of at most 100 characters, all but the first indented. */
function wrapped(first: string, text: string, indent: number): string {
  const lines: string[] = [];
  let line = first;
  let empty = true;
  for (const word of text.split(' ')) {
    if (!empty && line.length + 1 + word.length > WIDEST) {
      lines.push(line);
      line = ' '.repeat(indent);
      empty = true;
    }
    line += empty ? word : ` ${word}`;
    empty = false;
  }
  return [...lines, line].join('\n');
}
