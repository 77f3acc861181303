/** Runs over REST: one, its series, lists. Live frames bypass this cache (live/). */
import { queryOptions, useQuery } from '@tanstack/react-query';
import { decodeFrame, type Frame } from '@/shared/contracts/frames';
import type { Page } from '@/shared/contracts/common';
import type { BaselineTrack } from '@/shared/contracts/recordings';
import type { Run, RunListItem, RunState } from '@/shared/contracts/runs';
import { api, apiBytes, apiUrl } from './api';
import type { TileSource } from './finer/use-tiles';
import { RunData } from './live/run-data';
import { STALE } from './query-client';

export const runKeys = {
  all: ['runs'] as const,
  lists: ['runs', 'list'] as const,
  list: (query: RunListQuery) => ['runs', 'list', query] as const,
  one: (id: string) => ['runs', 'one', id] as const,
  curves: (id: string, points: number) => ['runs', 'curves', id, points] as const,
};

export interface RunListQuery {
  recordingId?: string;
  state?: RunState;
  limit?: number;
}

/** GET /runs/:id; not asked while `id` is null. */
export const oneRun = (id: string | null) =>
  queryOptions({
    queryKey: runKeys.one(id ?? ''),
    queryFn: () => api<Run>(`/runs/${id}`),
    enabled: id !== null,
    staleTime: STALE.slow,
  });
export const useRun = (id: string | null) => useQuery(oneRun(id));

/** GET /runs, newest first. */
export function useRuns(query: RunListQuery, enabled = true) {
  return useQuery({
    queryKey: runKeys.list(query),
    queryFn: () => api<Page<RunListItem>>('/runs', { query: { ...query } }),
    enabled,
  });
}

/** A finished run's curves in up to `points` rows a table; asked for while `id` is not null. */
export function useRunCurves(id: string | null, points: number) {
  return useQuery({
    queryKey: runKeys.curves(id ?? '', points),
    queryFn: ({ signal }) => fetchCurves(id ?? '', points, signal),
    enabled: id !== null,
    staleTime: Infinity,
    gcTime: 60_000,
  });
}

/** Rows of a finer piece of a run: two to a pixel of a wide screen, whatever part of the piece is in view. */
const PIECE_POINTS = 2000;

/** Where finer pieces of a run's curves come from. */
export const runTiles = (runId: string): TileSource<Frame> => ({
  key: ['runs', 'finer', runId],
  fetch: async ({ fromS, toS }, signal) =>
    decodeFrame(
      await apiBytes(`/runs/${runId}/series`, {
        query: { from: fromS, to: toS, points: PIECE_POINTS },
        signal,
      }),
    ),
  isWhole: ({ head }) => head.whole === true,
});

/** GET /recordings/:id/baseline-track: the GNSS-only solution that a run is looked at beside. */
export function useGnssOnlyTrack(recordingId: string) {
  return useQuery({
    queryKey: ['recordings', 'gnss-only', recordingId],
    queryFn: ({ signal }) =>
      api<BaselineTrack>(`/recordings/${recordingId}/baseline-track`, { query: { points: 3000 }, signal }),
    staleTime: Infinity,
  });
}

/** Address of a run's file for download. */
export const runFileUrl = (
  id: string,
  file: 'solution.csv' | 'innovations.csv' | 'track.geojson' | 'track.kml' | 'track.gpx',
) => apiUrl(`/runs/${id}/${file}`);

async function fetchCurves(id: string, points: number, signal: AbortSignal): Promise<RunData> {
  const data = new RunData(id);
  data.replace(decodeFrame(await apiBytes(`/runs/${id}/series`, { query: { points }, signal })), true);
  return data;
}
