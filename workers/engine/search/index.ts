/**
 * The search's public entry, apart from the engine's own: its optimiser takes half a second to load, which a worker that
 * only runs filters should not pay at its start. Import it where a search begins: `await import(…)`.
 */
export { createSearch } from './search';
export { TUNABLE_NAMES, type TunableName } from './tunables';
export type {
  Interval,
  Score,
  SearchCase,
  SearchRequest,
  SearchResult,
  SearchRun,
  Standing,
  Tuned,
  TunedValue,
} from './types';
