/** Parameter sets and their versions. */
import { queryOptions, useInfiniteQuery, useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type { Page } from '@/shared/contracts/common';
import type {
  ParameterSet,
  ParameterSetCreateInput,
  ParameterSetDetail,
  ParameterSetListQuery,
  ParameterSetVersion,
  VersionCreateInput,
} from '@/shared/contracts/parameter-sets';
import { api } from './api';
import { STALE } from './query-client';

/** What a list is narrowed down to; what is left out is the API's default. */
export type SetFilter = Partial<Pick<ParameterSetListQuery, 'search' | 'vehicleId' | 'state' | 'sort'>>;

export const setKeys = {
  all: ['parameter-sets'] as const,
  list: (filter: SetFilter) => ['parameter-sets', 'list', filter] as const,
  one: (id: string) => ['parameter-sets', 'one', id] as const,
};

export function useParameterSets(filter: SetFilter = {}) {
  return useInfiniteQuery({
    queryKey: setKeys.list(filter),
    queryFn: ({ pageParam, signal }) =>
      api<Page<ParameterSet>>('/parameter-sets', {
        query: { ...filter, cursor: pageParam, limit: 50 },
        signal,
      }),
    initialPageParam: '',
    getNextPageParam: (page) => page.nextCursor ?? undefined,
    staleTime: STALE.list,
  });
}

/** One set with all its versions; not asked while `id` is ''. */
export const oneSet = (id: string) =>
  queryOptions({
    queryKey: setKeys.one(id),
    queryFn: ({ signal }) => api<ParameterSetDetail>(`/parameter-sets/${id}`, { signal }),
    enabled: id !== '',
  });
export const useParameterSet = (id: string) => useQuery(oneSet(id));

export function useCreateParameterSet() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (input: ParameterSetCreateInput) =>
      api<ParameterSetDetail>('/parameter-sets', { method: 'POST', body: input }),
    onSuccess: () => client.invalidateQueries({ queryKey: setKeys.all }),
  });
}

export function useCreateVersion(setId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (input: VersionCreateInput) =>
      api<ParameterSetVersion>(`/parameter-sets/${setId}/versions`, { method: 'POST', body: input }),
    onSuccess: () => client.invalidateQueries({ queryKey: setKeys.all }),
  });
}
