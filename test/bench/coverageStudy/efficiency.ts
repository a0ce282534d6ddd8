import { simulateErrors } from '../../../src/campaign/index.js';
import { type Component, fitErrorModel } from '../../../src/fit/index.js';
import { invertSymmetric2 } from '../../../src/stats/index.js';

const CAMPAIGNS = 400;
const DAYS = 30;
const SEED = 900_000;

/**
 * Efficiency of A = a² and B = b² where the model is true and shots are independent: the Cramér-Rao bound, which is the
 * inverse of Σ x x' k/(2 μ²) with k axes, over the mean square error. Prints one line a component.
 */
export function efficiency(): void {
  console.log(`\n${CAMPAIGNS} campaigns of ${DAYS} alike days, independent shots, seeds ${SEED} + r:\n`);
  console.log('| component | efficiency of a² | efficiency of b² |\n|---|---|---|');
  for (const component of ['horizontal', 'vertical'] as const) {
    const [a, b] = efficiencies(component);
    console.log(`| ${component} | ${a.toFixed(2)} | ${b.toFixed(2)} |`);
  }
  const error = Math.sqrt(2 / CAMPAIGNS);
  console.log(
    `\nMonte Carlo error about ${error.toFixed(2)}; in the design simulation 0.92 and 1.11, which is 1 within its error.`,
  );
}

function efficiencies(component: Component): readonly [number, number] {
  const axes = component === 'horizontal' ? 2 : 1;
  const sums = { boundA: 0, boundB: 0, squareA: 0, squareB: 0 };
  for (let r = 1; r <= CAMPAIGNS; r++) {
    const { rows, truth } = simulateErrors({
      seed: SEED + r,
      days: DAYS,
      dayFactorLogSd: 0,
      dependent: false,
    });
    const { constantMm, longRunPpm } = truth.components[component];
    const [A, B] = [constantMm ** 2, longRunPpm ** 2];
    const information: [number, number, number] = [0, 0, 0];
    for (const { baselineKm } of rows) {
      const l = baselineKm ** 2;
      const v = axes / (2 * (A + B * l) ** 2);
      information[0] += v;
      information[1] += v * l;
      information[2] += v * l * l;
    }
    const bound = invertSymmetric2(information);
    const { variance } = fitErrorModel(rows, { component });
    sums.boundA += bound[0];
    sums.boundB += bound[2];
    sums.squareA += (variance!.A - A) ** 2;
    sums.squareB += (variance!.B - B) ** 2;
  }
  return [sums.boundA / sums.squareA, sums.boundB / sums.squareB];
}
