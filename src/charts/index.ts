export type { ChartSpec } from './chartSpec.js';
export { type ErrorByBaselineInput, errorByBaselineChart } from './errorByBaselineChart.js';
export { type MarkMapInput, markMapChart } from './markMapChart.js';
export { type MarkMeansInput, markMeansChart } from './markMeansChart.js';
export { renderPng, renderSvg } from './renderChart.js';
