import { everyCombo } from './comboFit.js';
import { DAY_COMBOS } from './dayGrid.js';
import { dayLogLikelihood, relativeLikelihood } from './dayLikelihood.js';
import type { DayPosterior } from './dayModel.js';
import { constantNodes, type DayModelNode } from './dayQuantiles.js';

/**
 * The nodes of the day model as the other days alone give them: the marginal likelihood of one day is taken out of the
 * weights of the combos. Constant and slope to which the days refer are those of the whole study.
 * @returns for a day the nodes without it; for a day that the study does not hold all nodes
 */
export function nodesWithoutDay(posterior: DayPosterior): (day: string) => DayModelNode[] {
  const { B, cells, effectiveShare } = posterior;
  const number = new Map(cells.days.map((day, d) => [day, d]));
  const days = cells.days.length;
  const nodes = constantNodes(posterior).map(({ A, weight }) => {
    const marginals = everyCombo(relativeLikelihood(dayLogLikelihood(cells, A, B, effectiveShare)));
    const logs = marginals.map(Math.log);
    const totals = Float64Array.from(DAY_COMBOS, (_, j) => {
      let total = 0;
      for (let d = 0; d < days; d++) total += logs[j * days + d]!;
      return total;
    });
    return { A, weight, logs, totals };
  });
  return (day) => {
    const d = number.get(day);
    return nodes.map(({ A, weight, logs, totals }) => {
      const rest = d === undefined ? totals : totals.map((total, j) => total - logs[j * days + d]!);
      const best = rest.reduce((a, b) => Math.max(a, b));
      const weights = rest.map((value, j) => Math.exp(value - best) * DAY_COMBOS[j]!.width);
      const total = weights.reduce((a, b) => a + b);
      return { A, weight, comboWeights: weights.map((value) => value / total) };
    });
  };
}
