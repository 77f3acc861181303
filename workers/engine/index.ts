/** The engine's public entry: a run over a recording. Pure: no files, no clock, no chance. */
export { createRun } from './run/run';
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
