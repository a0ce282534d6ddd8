import type { Rule } from '../rule/index.js';
import type { RuleMove } from '../study/index.js';
import { type Html, html } from './html.js';
import { moveWords } from './moveWords.js';
import type { Page } from './page.js';
import { table } from './table.js';

/** How far the limits move when one thing is changed. */
export function movesSection(page: Page, picture: Html | null): Html {
  const { ruleMoves, rules } = page.results;
  if (ruleMoves.length === 0 || rules.every(({ maximumBaselineKm }) => !maximumBaselineKm)) return html``;
  return html`<section id="moves"><h2>How the limit moves</h2>
<p>The first limit in plan and in height was found again with one thing changed: what moves it much, it hangs on.${
    ruleMoves.some(({ kind }) => kind === 'without a far mark')
      ? ' A limit that ends where the data end hangs on the marks that are far enough, so each of the farthest two was left out too.'
      : ''
  }</p>
${picture ?? movesTables(page)}
<p class="small">The numbers stand in the annex too.</p>
</section>
`;
}

/** All limits with one thing changed, and why some changes leave no rule. */
export function movesTables(page: Page): Html | null {
  const { ruleMoves } = page.results;
  if (ruleMoves.length === 0) return null;
  return html`${(['horizontal', 'vertical'] as const).map((component) => movesTable(page, component))}
${reasons(page, ruleMoves)}`;
}

/** One row for each change, one column for each limit. */
function movesTable(page: Page, component: Rule['component']): Html | null {
  const moves = page.results.ruleMoves.filter((move) => move.component === component);
  if (moves.length === 0) return null;
  const stated = moves.filter(({ kind }) => kind === 'as stated');
  const { distance, error } = page.units;
  const place = component === 'horizontal' ? 'in plan' : 'in height';
  const changes = moves.filter((move) => sameLimit(move, stated[0]!));
  return table<RuleMove>(`Limits ${place} with one thing changed: they hold to, ${distance.name}`, changes, [
    { head: 'Changed', cell: (move) => changeWords(page, move), text: true },
    ...stated.map((limit) => ({
      head: html`${page.number(limit, 'limitMm', 'limit')} ${error.name}, ${page.number(limit, 'share', 'share')}`,
      cell: (change: RuleMove) => {
        const found = moves.find((move) => sameLimit(move, limit) && sameChange(move, change));
        if (found === undefined) return '—';
        if (found.maximumBaselineKm === null) return 'no rule';
        return page.number(found, 'maximumBaselineKm', 'distance, rounded down');
      },
    })),
  ]);
}

const sameLimit = (a: RuleMove, b: RuleMove): boolean =>
  a.limitMm === b.limitMm && a.share === b.share && a.dayShare === b.dayShare;

const sameChange = (a: RuleMove, b: RuleMove): boolean => a.kind === b.kind && a.subject === b.subject;

export const changeWords = (page: Page, move: RuleMove): string => moveWords(move, (name) => page.crew(name));

/** Why changes leave no rule; said once for each reason. */
function reasons(page: Page, moves: readonly RuleMove[]): Html[] {
  const without = moves.filter(({ maximumBaselineKm }) => maximumBaselineKm === null);
  const first = without.filter(
    (move, k) => without.findIndex((other) => other.reason === move.reason && sameChange(other, move)) === k,
  );
  return first.map(
    (move) =>
      html`<p class="small">No rule, ${changeWords(page, move)}: ${page.text(move.reason ?? '')}.</p>\n`,
  );
}
