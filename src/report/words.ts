import type { Message } from '../logs/index.js';
import type { Rule } from '../rule/index.js';
import type { FileResult, FitResult, Results } from '../study/index.js';
import { count, kmDown, mm, NOT_GIVEN, percent, ppm, withLimits } from './format.js';

/** Printed with every result. */
export const CAUTIONS: readonly string[] = [
  'The rule holds for positions that the receiver called fixed, at the sites, seasons, receivers, crews and procedures in the data, and for nothing else.',
  'It is no substitute for redundant checks, for local codes, for the accuracy standards of clients and of the law, or for the judgement of a licensed surveyor.',
  'Positions that the safety of people hangs on need independent verification.',
];

/** What a reader must know of how the numbers of this version were found. */
export const LIMITS: readonly string[] = [
  'Positions that were called fixed with wrong ambiguities are not looked for: a few of them make constant and ppm larger.',
  'Errors of the coordinates of marks are part of the errors: with few marks, or poor coordinates, they pass for ppm.',
  'Single days, hours and the state of the ionosphere are not judged.',
];

/** Days worse than all those observed may have been missed: with none among G, they are at most about 3/G (95 %). */
export function unseenDays(days: number): string {
  return `All of this is said of the ${days} days observed. Days worse than any of these may be as many as ${percent(Math.min(1, 3 / days))} without one having been met.`;
}

/** What the words of the report mean. */
export const GLOSSARY: readonly (readonly [word: string, meaning: string])[] = [
  ['base', 'the point on which the base receiver runs; distances are counted from it'],
  ['baseline', 'the straight line from base to rover; its length in km'],
  ['mark', 'a point with known coordinates'],
  ['visit', "a crew's stay at a mark, with or without a fix"],
  ['occupation', 'consecutive fixed positions of one visit, averaged; the unit that is analysed'],
  ['error', 'measured minus known, in mm'],
  ['ellipsoidal height', 'height above the ellipsoid of the reference frame, which satellites give'],
  [
    'orthometric height',
    'height above the geoid, about sea level: ellipsoidal height minus geoid separation',
  ],
  [
    'combined factor',
    'length on the grid over length on the ground: point scale of the projection times height factor',
  ],
  ['constant', 'the part of the spread that does not depend on distance, mm'],
  ['ppm', 'the part that grows with distance: 1 ppm is 1 mm per km'],
  ['radial RMS', 'root of the mean of east² + north²; about 63 % of positions are within it'],
  ['vertical RMS', 'root of the mean of up²; about 68 % of positions are within it'],
  ['root-sum-square', 'constant and ppm part are added as squares: spread² = constant² + (ppm × distance)²'],
  ['linear-sum', 'constant and ppm part are added as they are: spread = constant + ppm × distance'],
  ['tolerance', 'a limit and the share of positions that must be within it'],
  [
    'maximum baseline',
    'the distance from the base up to which a tolerance holds, with the stated confidence',
  ],
];

/** What is named with every vertical error. */
export type HeightKind = Results['heights'];

export const componentTitle = (component: Rule['component'], heights: HeightKind): string =>
  component === 'horizontal' ? 'Horizontal (radial)' : `Vertical (${heights} heights)`;

const positions = (rule: Rule, heights: HeightKind | undefined): string =>
  `${percent(rule.share)} of ${rule.component} positions${rule.component === 'vertical' && heights !== undefined ? ` (${heights} heights)` : ''} within ${Number(rule.limitMm.toFixed(1))}\u00a0mm`;

/** A rule in two parts: how far, and what holds there or why nothing does. */
export function ruleParts(
  rule: Rule,
  heights?: HeightKind,
): { readonly head: string; readonly body: string } {
  const { maximumBaselineKm: limit, reason } = rule;
  if (limit === null) return { head: 'No rule', body: `for ${positions(rule, heights)}: ${reason}.` };
  if (limit === 0) {
    return {
      head: 'At no distance from the base',
      body: `${positions(rule, heights)} cannot be promised: ${reason}.`,
    };
  }
  const when =
    rule.method === 'pooled' ? 'over all days together' : `on at least ${percent(rule.dayShare)} of days`;
  const body = `${positions(rule, heights)}, with ${percent(rule.confidence)} confidence ${when}.`;
  return {
    head: `Up to ${kmDown(limit)}\u00a0km from the base`,
    body: reason === null ? body : `${body} ${capital(reason)}.`,
  };
}

/** A rule as one sentence that can stand in a method statement. */
export function ruleSentence(rule: Rule, heights?: HeightKind): string {
  const { head, body } = ruleParts(rule, heights);
  return rule.maximumBaselineKm === null ? `${head} ${body}` : `${head}: ${body}`;
}

/** Why a study has no rule at all. */
export const whyNoRule = ({ fits }: Results): string =>
  fits.length === 0
    ? 'no fit was possible; the messages below say why'
    : 'the study file states no tolerance';

const ADDED = { 'root-sum-square': 'added as squares', 'linear-sum': 'added as they are' } as const;

/**
 * The fits that a reader needs: of each component the one behind the rules, and beside it that against the published
 * coordinates where the two differ. The others stand in the tables.
 */
export const shownFits = ({ fits }: Pick<Results, 'fits'>): FitResult[] =>
  fits.filter(({ basisOfRule, component, reference, form, screened }) => {
    if (basisOfRule) return true;
    const basis = fits.find((fit) => fit.basisOfRule && fit.component === component)!;
    return reference === 'absolute' && form === basis.form && screened === basis.screened;
  });

/** What errors are counted from, in a surveyor's words. */
export const REFERENCE_WORDS: Readonly<Record<FitResult['reference'], string>> = {
  absolute: 'against the published coordinates',
  repeatability: 'repeatability: how well a position is found again on another day',
  relative: "relative to each setup's common offset",
};

/** A fit as one sentence. */
export function fitSentence(fit: FitResult, heights: HeightKind): string {
  const level = percent(fit.confidence);
  const constant = `${withLimits(fit.constantMm, mm)} mm`;
  const distance = withLimits(fit.ppm, ppm);
  const form =
    distance === NOT_GIVEN
      ? `${constant} at all distances in the data`
      : `${constant} and ${distance} ppm, ${ADDED[fit.form]}`;
  return `${componentTitle(fit.component, heights)}, ${REFERENCE_WORDS[fit.reference]}: ${form} (${fit.basis}; ${level} intervals in brackets).`;
}

export const capital = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);

/** What was set aside of a file: each reason, how many rows, and the first lines. */
export function setAsideWords(setAside: FileResult['setAside']): string {
  return Object.entries(setAside)
    .map(([reason, { count: rows, firstRows }]) => {
      const lines = `${firstRows.length === 1 ? 'line' : 'lines'} ${firstRows.join(', ')}${rows > firstRows.length ? ', …' : ''}`;
      return `${reason} ${count(rows)} (${lines})`;
    })
    .join(', ');
}

/** Findings that spoil every number: they are told first, and beside the rule. */
const SPOILING: ReadonlySet<string> = new Set([
  'swapped-axes',
  'plan-unit',
  'height-unit',
  'wrong-zone',
  'height-kind',
  'base-coordinate',
  'frame-or-base',
  'rod-height',
  'grid-for-ground',
  'systematic-scale',
  'rotated',
  'tilted',
  'mark-far-off',
  'marks-far-off',
  'error-over-10-m',
  'systematic-offset',
  'not-converged',
]);

export const spoiling = (messages: readonly Message[]): Message[] =>
  messages.filter(({ code }) => SPOILING.has(code));

/** A message with the files in which the same was found. */
export interface GroupedMessage extends Message {
  /** Other files of which the same is told but for numbers. */
  readonly otherFiles: number;
}

const SEVERITIES: Readonly<Record<Message['severity'], number>> = { error: 0, warning: 1, info: 2 };

/** Messages with the most severe first, among them what spoils every number; the same of many files is told once. */
export function groupedMessages(messages: readonly Message[]): GroupedMessage[] {
  const groups = new Map<string, { first: Message; files: Set<string> }>();
  for (const told of messages) {
    // Only other files can say the same again; what a file says twice is two things.
    const file = told.file ?? '';
    const alike = `${told.code} ${told.column} ${told.text.replace(/\d+/g, '#')}`;
    const key = file === '' || groups.get(alike)?.files.has(file) ? `${groups.size}` : alike;
    const group = groups.get(key);
    if (group === undefined) groups.set(key, { first: told, files: new Set([file]) });
    else group.files.add(file);
  }
  const rank = ({ severity, code }: Message): number =>
    2 * SEVERITIES[severity] + (SPOILING.has(code) ? 0 : 1);
  return [...groups.values()]
    .map(({ first, files }) => ({ ...first, otherFiles: files.size - 1 }))
    .sort((a, b) => rank(a) - rank(b));
}

/** `(the same in 19 other files)`, or nothing. */
export const otherFilesWords = ({ otherFiles }: GroupedMessage): string =>
  otherFiles === 0 ? '' : ` (the same in ${count(otherFiles)} other ${otherFiles === 1 ? 'file' : 'files'})`;
