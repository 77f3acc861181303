/**
 * Public entry of the quiet charts. One module for all of them: imported dynamically from one place, the library behind
 * them makes a chunk of its own instead of joining the first one.
 */
export { AutocorrelationChart } from './AutocorrelationChart';
export { BudgetChart } from './BudgetChart';
export { DriftGrowthChart } from './DriftGrowthChart';
export { HistogramChart } from './HistogramChart';
export { AllanChart } from './AllanChart';
