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
import type { Page } from '@/shared/contracts/common';
import type {
  ChannelMap,
  Recording,
  RecordingMeta,
  RecordingPatch,
  Series,
  SeriesChannel,
} from '@/shared/contracts/recordings';
import { api, apiUpload, type Upload } from './api';
import { STALE } from './query-client';

export const recordingKeys = {
  all: ['recordings'] as const,
  list: (search: string) => ['recordings', 'list', search] as const,
  one: (id: string) => ['recordings', 'one', id] as const,
  series: (id: string, query: SeriesRequest) => ['recordings', 'series', id, query] as const,
};

/** How often a recording that is being decoded is looked at, ms. */
const WATCH_MS = 1000;

export const isUnderWay = (recording: Pick<Recording, 'status'>): boolean =>
  recording.status === 'uploaded' || recording.status === 'decoding';

/** Newest first, a page at a time; looks again while any of them is being decoded. */
export function useRecordings(search = '') {
  return useInfiniteQuery({
    queryKey: recordingKeys.list(search),
    queryFn: ({ pageParam, signal }) =>
      api<Page<Recording>>('/recordings', { query: { search, cursor: pageParam, limit: 30 }, signal }),
    initialPageParam: '',
    getNextPageParam: (page) => page.nextCursor ?? undefined,
    staleTime: STALE.list,
    refetchInterval: (query) => (itemsOf(query.state.data).some(isUnderWay) ? WATCH_MS : false),
  });
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
  gnss: File;
  reference?: File;
}

/** Sends the files; `meta` goes first so that the server can refuse before the bulk arrives. */
export function uploadRecording(
  input: UploadInput,
  onProgress: (sent: number, total: number) => void,
): Upload<Recording> {
  const form = new FormData();
  form.append('meta', JSON.stringify(input.meta));
  form.append('imu', input.imu, input.imu.name);
  form.append('gnss', input.gnss, input.gnss.name);
  if (input.reference) form.append('reference', input.reference, input.reference.name);
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

function keep(client: QueryClient, recording: Recording) {
  client.setQueryData(recordingKeys.one(recording.id), recording);
  return client.invalidateQueries({ queryKey: ['recordings', 'list'] });
}
