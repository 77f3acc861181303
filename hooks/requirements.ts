/** Requirements: limits on metrics, judged on recordings. */
import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type { Page } from '@/shared/contracts/common';
import type { Requirement, RequirementInput } from '@/shared/contracts/requirements';
import { api } from './api';
import { setKeys } from './parameter-sets';
import { STALE } from './query-client';

const keys = {
  all: ['requirements'] as const,
  list: (vehicleId: string) => ['requirements', 'list', vehicleId] as const,
  one: (id: string) => ['requirements', 'one', id] as const,
};

/** All of the workspace; with a vehicle those that apply to it. */
export const useRequirements = (vehicleId = '') =>
  useQuery({
    queryKey: keys.list(vehicleId),
    queryFn: async ({ signal }) =>
      (
        await api<Page<Requirement>>('/requirements', {
          query: { limit: 200, vehicleId: vehicleId || undefined },
          signal,
        })
      ).items,
    staleTime: STALE.list,
  });

export const useRequirement = (id: string) =>
  useQuery({
    queryKey: keys.one(id),
    queryFn: ({ signal }) => api<Requirement>(`/requirements/${id}`, { signal }),
    enabled: id !== '',
  });

/** With an id the requirement is changed, without one it is added. */
export function useSaveRequirement(id: string | null) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: RequirementInput) =>
      id === null
        ? api<Requirement>('/requirements', { method: 'POST', body })
        : api<Requirement>(`/requirements/${id}`, { method: 'PATCH', body }),
    onSuccess: () => refresh(client),
  });
}

export function useDeleteRequirement() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (id: string) => api<void>(`/requirements/${id}`, { method: 'DELETE' }),
    onSuccess: () => refresh(client),
  });
}

/** What was judged by it is out of date too. */
const refresh = (client: ReturnType<typeof useQueryClient>) =>
  Promise.all([
    client.invalidateQueries({ queryKey: keys.all }),
    client.invalidateQueries({ queryKey: [...setKeys.all, 'verification'] }),
  ]);
