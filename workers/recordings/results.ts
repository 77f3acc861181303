/** The kept result of a run as Arrow files, and its way back. Innovations of both groups share one file, position first. */
import { createHash } from 'node:crypto';
import type { InnovationTable, RunResult } from '../engine/types';
import { storeKeys, type Store } from '../store/types';
import { readTable, writeTable, type Columns } from './arrow-file';

export type RunTables = Pick<RunResult, 'solution' | 'position' | 'velocity' | 'coasting' | 'smoothed'> & {
  origin: { latDeg: number; lonDeg: number; heightM: number };
  extentS: readonly [number, number];
};

const POSITION_ROWS = 'position_rows';
const INNOVATION_FILE_COLUMNS = [
  'time_s', 'innovation_n', 'innovation_e', 'innovation_d', 'sigma_n', 'sigma_e', 'sigma_d', 'nis', 'accepted',
] as const; // prettier-ignore

/** Writes all files of a run; answers the SHA-256 over them in the order solution, innovations, coasting, smoothed. */
export async function writeRunTables(store: Store, runId: string, tables: RunTables): Promise<string> {
  const { origin, extentS } = tables;
  const head = new Map([
    ['origin', JSON.stringify([origin.latDeg, origin.lonDeg, origin.heightM])],
    ['extent_s', JSON.stringify(extentS)],
  ]);
  const parts = [innovationColumns(tables.position), innovationColumns(tables.velocity)];
  const innovations = Object.fromEntries(
    INNOVATION_FILE_COLUMNS.map((name) => [name, concat(parts.map((part) => part[name]!))]),
  );
  const split = new Map([[POSITION_ROWS, String(tables.position.timeS.length)]]);
  const written = await Promise.all([
    writeTable(store, storeKeys.solution(runId), tables.solution, head),
    writeTable(store, storeKeys.innovations(runId), innovations, split),
    writeTable(store, storeKeys.coasting(runId), tables.coasting),
    ...(tables.smoothed ? [writeTable(store, storeKeys.smoothed(runId), tables.smoothed)] : []),
  ]);
  const hash = createHash('sha256');
  for (const file of written) hash.update(file.sha256, 'hex');
  return hash.digest('hex');
}

/** Throws StoreKeyMissing where the run's files are gone. */
export async function readRunTables(store: Store, runId: string): Promise<RunTables> {
  const [solution, innovations, coasting, smoothed] = await Promise.all([
    readTable(store, storeKeys.solution(runId)),
    readTable(store, storeKeys.innovations(runId)),
    readTable(store, storeKeys.coasting(runId)),
    readSmoothed(store, runId),
  ]);
  const [latDeg, lonDeg, heightM] = JSON.parse(solution.metadata.get('origin') ?? '[0,0,0]') as number[];
  const [startS, endS] = JSON.parse(solution.metadata.get('extent_s') ?? '[0,0]') as number[];
  const positionRows = Number(innovations.metadata.get(POSITION_ROWS) ?? innovations.rows);
  return {
    solution: solution.columns,
    position: innovationTable(innovations.columns, 0, positionRows),
    velocity: innovationTable(innovations.columns, positionRows, innovations.rows),
    coasting: coasting.columns,
    smoothed,
    origin: { latDeg: latDeg!, lonDeg: lonDeg!, heightM: heightM! },
    extentS: [startS!, endS!],
  };
}

async function readSmoothed(store: Store, runId: string): Promise<Columns | null> {
  const key = storeKeys.smoothed(runId);
  return (await store.has(key)) ? (await readTable(store, key)).columns : null;
}

function innovationColumns(table: InnovationTable): Columns {
  return {
    time_s: table.timeS,
    innovation_n: table.innovation[0],
    innovation_e: table.innovation[1],
    innovation_d: table.innovation[2],
    sigma_n: table.sigma[0],
    sigma_e: table.sigma[1],
    sigma_d: table.sigma[2],
    nis: table.nis,
    accepted: Float64Array.from(table.accepted),
  };
}

function innovationTable(c: Columns, from: number, to: number): InnovationTable {
  const part = (name: (typeof INNOVATION_FILE_COLUMNS)[number]) => c[name]!.subarray(from, to);
  return {
    timeS: part('time_s'),
    innovation: [part('innovation_n'), part('innovation_e'), part('innovation_d')],
    sigma: [part('sigma_n'), part('sigma_e'), part('sigma_d')],
    nis: part('nis'),
    accepted: Uint8Array.from(part('accepted')),
  };
}

function concat(parts: readonly Float64Array[]): Float64Array {
  const whole = new Float64Array(parts.reduce((sum, part) => sum + part.length, 0));
  let at = 0;
  for (const part of parts) {
    whole.set(part, at);
    at += part.length;
  }
  return whole;
}
