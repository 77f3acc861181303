/** The engine's public entry: a run over a recording, and the search for its parameters. Pure: no files, no clock, no chance. */
export { createRun } from './run/run';
export { createSearch } from './search/search';
export { TUNABLE_NAMES, type TunableName } from './search/tunables';
export type {
  Interval,
  SearchCase,
  SearchRequest,
  SearchResult,
  SearchRun,
  Tuned,
  TunedValue,
} from './search/types';
export { ENGINE_VERSION, EngineError } from './types';
export type {
  AidColumns,
  CoastingTable,
  EngineRun,
  GnssColumns,
  ImuColumns,
  ImuSampling,
  InnovationTable,
  RecordingColumns,
  ReferenceColumns,
  RunRequest,
  RunResult,
  SolutionTable,
} from './types';
