/** Recordings: list, one, upload, rename, map, delete, plots. */
import {
  keepPreviousData,
  useInfiniteQuery,
  useMutation,
  useQuery,
  useQueryClient,
  type InfiniteData,
  type QueryClient,
} from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import type { Page } from '@/shared/contracts/common';
import type {
  ChannelMap,
  FileRole,
  MapPreview,
  Recording,
  RecordingListQuery,
  RecordingMeta,
  RecordingPatch,
  Series,
  SeriesChannel,
} from '@/shared/contracts/recordings';
import { api, ApiProblem, apiUpload, type Upload } from './api';
import type { TileSource } from './finer/use-tiles';
import { STALE } from './query-client';
import { useDebounced } from './use-debounced';

/** What a list is narrowed down to; what is left out is the API's default. */
export type RecordingFilter = Partial<
  Pick<RecordingListQuery, 'search' | 'vehicleId' | 'status' | 'since' | 'sort'>
>;

/** What somebody may have to do something about, or wait for. */
export const NOT_READY: RecordingFilter = { status: ['uploaded', 'decoding', 'needs-mapping', 'rejected'] };
export const READY: RecordingFilter = { status: ['ready'] };

export const recordingKeys = {
  all: ['recordings'] as const,
  list: (filter: RecordingFilter) => ['recordings', 'list', filter] as const,
  one: (id: string) => ['recordings', 'one', id] as const,
  series: (id: string, query: SeriesRequest) => ['recordings', 'series', id, query] as const,
  preview: (id: string, map: string) => ['recordings', 'map-preview', id, map] as const,
  ofVehicle: (vehicleId: string) => ['recordings', 'list', 'vehicle', vehicleId] as const,
};

/** How often a recording that is being decoded is looked at, ms. */
const WATCH_MS = 1000;

export const isUnderWay = (recording: Pick<Recording, 'status'>): boolean =>
  recording.status === 'uploaded' || recording.status === 'decoding';

/** Newest first unless asked otherwise, a page at a time; looks again while any of them is being decoded. */
export function useRecordings(filter: RecordingFilter = {}) {
  return useInfiniteQuery({
    queryKey: recordingKeys.list(filter),
    queryFn: ({ pageParam, signal }) =>
      api<Page<Recording>>('/recordings', {
        query: { ...filter, status: filter.status?.join(','), cursor: pageParam, limit: 30 },
        signal,
      }),
    initialPageParam: '',
    getNextPageParam: (page) => page.nextCursor ?? undefined,
    staleTime: STALE.list,
    refetchInterval: (query) => (itemsOf(query.state.data).some(isUnderWay) ? WATCH_MS : false),
  });
}

/** Looks again for decoded recordings whenever another number is under way: one of them may have become ready. */
export function useFreshReady(underWay: number): void {
  const client = useQueryClient();
  useEffect(() => {
    void client.invalidateQueries({ queryKey: recordingKeys.list(READY) });
  }, [client, underWay]);
}

/** All items of the pages that were fetched so far. */
export const itemsOf = <T>(data: InfiniteData<Page<T>> | undefined): T[] =>
  data?.pages.flatMap((page) => page.items) ?? [];

export function useRecording(id: string) {
  return useQuery({
    queryKey: recordingKeys.one(id),
    queryFn: ({ signal }) => api<Recording>(`/recordings/${id}`, { signal }),
    enabled: id !== '',
    refetchInterval: (query) => (query.state.data && isUnderWay(query.state.data) ? WATCH_MS : false),
  });
}

export function usePatchRecording(id: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (patch: RecordingPatch) =>
      api<Recording>(`/recordings/${id}`, { method: 'PATCH', body: patch }),
    onSuccess: (recording) => keep(client, recording),
  });
}

/** Maps the columns and decodes again. */
export function useMapRecording(id: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (map: ChannelMap) =>
      api<Recording>(`/recordings/${id}/channel-map`, { method: 'PUT', body: map }),
    onSuccess: (recording) => keep(client, recording),
  });
}

const PREVIEW_PAUSE_MS = 400;

/**
 * What a map makes of the first rows, once it has stood still. `map` null: nothing to ask, the latest answer stays.
 * While a newer answer is on its way, and where it fails, the older one stays too.
 */
export function useMapPreview(id: string, map: ChannelMap | null) {
  const now = map ? JSON.stringify(map) : '';
  const asked = useDebounced(now, PREVIEW_PAUSE_MS);
  const query = useQuery({
    queryKey: recordingKeys.preview(id, asked),
    queryFn: ({ signal }) =>
      api<MapPreview>(`/recordings/${id}/map-preview`, {
        method: 'POST',
        body: JSON.parse(asked) as ChannelMap,
        signal,
      }),
    enabled: asked !== '',
    staleTime: STALE.slow,
    placeholderData: keepPreviousData,
    retry: (count, error) => isSuperseded(error) && count < 4,
    retryDelay: PREVIEW_PAUSE_MS,
  });
  const [latest, setLatest] = useState<MapPreview>();
  if (query.data && query.data !== latest) setLatest(query.data);
  return {
    preview: query.data ?? latest,
    computing: query.isFetching || asked !== now,
    // Another window's preview took the place of this one: no fault of the map.
    error: isSuperseded(query.error) ? null : query.error,
  };
}

const isSuperseded = (error: unknown) => error instanceof ApiProblem && error.status === 409;

/** How many earlier recordings of a vehicle are looked through for their mapping. */
const EARLIER = 8;

/** The latest decoded recordings of a vehicle; '' for none. */
export function useRecordingsOfVehicle(vehicleId: string) {
  return useQuery({
    queryKey: recordingKeys.ofVehicle(vehicleId),
    queryFn: ({ signal }) =>
      api<Page<Recording>>('/recordings', {
        query: { vehicleId, status: 'ready', limit: EARLIER },
        signal,
      }),
    enabled: vehicleId !== '',
    select: (page) => page.items,
    staleTime: STALE.list,
  });
}

/** Accepts the remedy of a finding, or (null) takes the latest back; the recording is decoded again. */
export function useRemedy(id: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (code: string | null) =>
      code === null
        ? api<Recording>(`/recordings/${id}/remedies/undo`, { method: 'POST' })
        : api<Recording>(`/recordings/${id}/remedies`, { method: 'POST', body: { code } }),
    onSuccess: (recording) => keep(client, recording),
  });
}

export function useDeleteRecording() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (id: string) => api<void>(`/recordings/${id}`, { method: 'DELETE' }),
    onSuccess: async (_, id) => {
      client.removeQueries({ queryKey: recordingKeys.one(id) });
      await client.invalidateQueries({ queryKey: recordingKeys.all });
    },
  });
}

export interface UploadInput {
  meta: RecordingMeta;
  imu: File;
  /** Left out where the IMU log holds the fixes. */
  gnss?: File;
  /** What the first IMU log lacks, where gyro and accelerometer have a file each. */
  imu2?: File;
  reference?: File;
  /** Barometer, heading, odometer. */
  aids?: File;
}

/** The files of an upload, in the order in which they are sent. */
export const filesOf = ({ imu, gnss, imu2, reference, aids }: UploadInput): [FileRole, File][] =>
  (Object.entries({ imu, gnss, imu2, reference, aids }) as [FileRole, File | undefined][]).flatMap(
    ([role, file]) => (file ? [[role, file]] : []),
  );

/** Sends the files; `meta` goes first so that the server can refuse before the bulk arrives. */
export function uploadRecording(
  input: UploadInput,
  onProgress: (sent: number, total: number) => void,
): Upload<Recording> {
  const form = new FormData();
  form.append('meta', JSON.stringify(input.meta));
  for (const [role, file] of filesOf(input)) form.append(role, file, file.name);
  return apiUpload<Recording>('/recordings', form, onProgress);
}

/** For after an upload: the list shows the new recording at once. */
export function useKeepRecording() {
  const client = useQueryClient();
  return (recording: Recording) => keep(client, recording);
}

export interface SeriesRequest {
  channels: readonly SeriesChannel[];
  from?: number;
  to?: number;
  points?: number;
}

/** Decimated channels for plots; minimum and maximum are kept. */
export function useRecordingSeries(id: string, request: SeriesRequest, enabled = true) {
  return useQuery({
    queryKey: recordingKeys.series(id, request),
    queryFn: ({ signal }) =>
      api<Series>(`/recordings/${id}/series`, {
        query: { ...request, channels: request.channels.join(',') },
        signal,
      }),
    enabled: enabled && id !== '',
    staleTime: STALE.slow,
    // A finer stretch replaces the coarse one when it is there.
    placeholderData: keepPreviousData,
  });
}

const PIECE_POINTS = 2400;

/** Where finer pieces of a recording's channels come from. */
export const recordingTiles = (id: string, channels: readonly SeriesChannel[]): TileSource<Series> => ({
  key: ['recordings', 'finer', id],
  fetch: ({ fromS, toS }, signal) =>
    api<Series>(`/recordings/${id}/series`, {
      query: { channels: channels.join(','), from: fromS, to: toS, points: PIECE_POINTS },
      signal,
    }),
  // Of buckets of two samples or less every one is there.
  isWhole: ({ channels: found }) => found.every(({ timeS }) => timeS.length <= PIECE_POINTS / 2),
});

function keep(client: QueryClient, recording: Recording) {
  client.setQueryData(recordingKeys.one(recording.id), recording);
  return client.invalidateQueries({ queryKey: ['recordings', 'list'] });
}
