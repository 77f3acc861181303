/**
 * The screens and cards that draw charts or talk to live runs, as one module. It is imported dynamically, from every
 * place that needs any of it, so that all of this makes one chunk of its own: what two chunks share would be loaded with the first
 * screen, and sign-in and lists do without.
 */
export { BenchScreen } from './bench/BenchScreen';
export { CompareScreen } from './compare/CompareScreen';
export { NoiseScreen } from './noise/NoiseScreen';
export { ReportScreen } from './report/ReportScreen';
export { ChannelCharts } from './recordings/ChannelCharts';
