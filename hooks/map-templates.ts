/** Templates of a channel map, kept with a vehicle. */
import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type { Page } from '@/shared/contracts/common';
import type { MapTemplate, MapTemplateInput } from '@/shared/contracts/map-templates';
import { api } from './api';
import { STALE } from './query-client';

const keyOf = (vehicleId: string) => ['map-templates', vehicleId] as const;

/** Newest first; '' for no vehicle. */
export function useMapTemplates(vehicleId: string) {
  return useQuery({
    queryKey: keyOf(vehicleId),
    queryFn: async ({ signal }) =>
      (
        await api<Page<MapTemplate>>(`/vehicles/${vehicleId}/map-templates`, {
          query: { limit: 200 },
          signal,
        })
      ).items,
    enabled: vehicleId !== '',
    staleTime: STALE.list,
  });
}

export function useCreateMapTemplate() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ vehicleId, ...input }: MapTemplateInput & { vehicleId: string }) =>
      api<MapTemplate>(`/vehicles/${vehicleId}/map-templates`, { method: 'POST', body: input }),
    onSuccess: ({ vehicleId }) => client.invalidateQueries({ queryKey: keyOf(vehicleId) }),
  });
}

export function useDeleteMapTemplate(vehicleId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (id: string) => api<void>(`/vehicles/${vehicleId}/map-templates/${id}`, { method: 'DELETE' }),
    onSuccess: () => client.invalidateQueries({ queryKey: keyOf(vehicleId) }),
  });
}
