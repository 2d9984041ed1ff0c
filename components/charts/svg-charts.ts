/** The charts and what draws them, in one part that only the screens with a chart fetch. */
export { ConvergenceChart } from './convergence-chart';
export { LineChart } from './line-chart';
