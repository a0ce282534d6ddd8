import type { EstimateWithLimits } from '../fit/index.js';
import type { Rule } from '../rule/index.js';
import {
  type FileResult,
  type FitResult,
  type ReaderUnits,
  type Results,
  readerUnits,
  textInUnits,
} from '../study/index.js';
import { count, formatNumber, NOT_GIVEN, type NumberKind, percent } from './format.js';
import { type Html, html, plainText } from './html.js';

/** What is named with every vertical error. */
export type HeightKind = Results['heights'];

export const componentTitle = (component: Rule['component'], heights: HeightKind): string =>
  component === 'horizontal' ? 'Horizontal (radial)' : `Vertical (${heights} heights)`;

/** `95 % of horizontal positions within 25 mm`. */
function positions(rule: Rule, { write, units, heights }: RuleWriter): Html {
  const kind = rule.component === 'vertical' && heights !== undefined ? ` (${heights} heights)` : '';
  return html`${write(rule, 'share', 'share')} of ${rule.component} positions${kind} within ${write(rule, 'limitMm', 'limit')}\u00a0${units.error.name}`;
}

/** How numbers of a rule are written, and with which words. */
export interface RuleWriter {
  readonly write: (rule: Rule, key: keyof Rule, kind: NumberKind) => Html;
  readonly text: (sentence: string) => string;
  readonly units: ReaderUnits;
  readonly heights: HeightKind | undefined;
}

/** Numbers without their places in the results, for a terminal. */
const plainWriter = (heights: HeightKind | undefined, units: ReaderUnits): RuleWriter => ({
  write: (rule, key, kind) => html`${formatNumber(rule[key] as number | null, kind, units)}`,
  text: (sentence) => textInUnits(sentence, units),
  units,
  heights,
});

/** A rule in two parts: how far, and what holds there or why nothing does. */
export function ruleParts(rule: Rule, writer: RuleWriter): { readonly head: Html; readonly body: Html } {
  const { maximumBaselineKm: limit, reason } = rule;
  const { write, text, units } = writer;
  const holds = positions(rule, writer);
  if (limit === null) return { head: html`No rule`, body: html`for ${holds}: ${text(reason ?? '')}.` };
  if (limit === 0) {
    return {
      head: html`At no distance from the base`,
      body: html`${holds} cannot be promised: ${text(reason ?? '')}.`,
    };
  }
  const when = byDays(rule)
    ? html`on at least ${write(rule, 'dayShare', 'share')} of days`
    : html`over all days together`;
  const body = html`${holds}, with ${write(rule, 'confidence', 'share')} confidence ${when}.`;
  return {
    head: html`Up to ${write(rule, 'maximumBaselineKm', 'distance, rounded down')}\u00a0${units.distance.name} from the base`,
    body: reason === null ? body : html`${body} ${capital(text(reason))}.`,
  };
}

/** Whether a rule says on how many single days it holds. */
export const byDays = ({ method }: Rule): boolean => method === 'day-model';

/** A rule as one sentence that can stand in a method statement. */
export function ruleSentence(
  rule: Rule,
  heights?: HeightKind,
  units: ReaderUnits = readerUnits('metric'),
): string {
  const { head, body } = ruleParts(rule, plainWriter(heights, units));
  const joined = rule.maximumBaselineKm === null ? html`${head} ${body}` : html`${head}: ${body}`;
  return plainText(joined);
}

/** Why a study has no rule at all. */
export const whyNoRule = ({ fits }: Results): string =>
  fits.length === 0
    ? 'no fit was possible; the messages below say why'
    : 'the study file states no tolerance';

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
export function fitSentence(
  fit: FitResult,
  heights: HeightKind,
  units: ReaderUnits = readerUnits('metric'),
): string {
  const level = percent(fit.confidence);
  const constant = `${limitsText(fit.constantMm, 'error', units)} ${units.error.name}`;
  const distance = limitsText(fit.ppm, 'ppm', units);
  const form =
    distance === NOT_GIVEN
      ? `${constant} at all distances in the data`
      : `${constant} and ${distance} ppm, ${ADDED[fit.form]}`;
  return `${componentTitle(fit.component, heights)}, ${REFERENCE_WORDS[fit.reference]}: ${form} (${fit.basis}; ${level} intervals in brackets).`;
}

/** How the two parts of a form are added. */
export const ADDED = { 'root-sum-square': 'added as squares', 'linear-sum': 'added as they are' } as const;

function limitsText(
  { estimate, low, high }: EstimateWithLimits,
  kind: NumberKind,
  units: ReaderUnits,
): string {
  const show = (value: number | null): string => formatNumber(value, kind, units);
  if (estimate === null && high === null) return NOT_GIVEN;
  if (estimate === null) return `below ${show(high)}`;
  if (low === null || high === null) return show(estimate);
  return `${show(estimate)} (${show(low)} to ${show(high)})`;
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
