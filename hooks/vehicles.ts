/** Vehicles: IMU mounting and antenna lever arm. */
import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type { Page } from '@/shared/contracts/common';
import type { Vehicle, VehicleInput, VehicleListQuery, VehiclePatch } from '@/shared/contracts/vehicles';
import { api } from './api';
import { STALE } from './query-client';

/** What a list is narrowed down to; what is left out is the API's default. */
export type VehicleFilter = Partial<Pick<VehicleListQuery, 'search' | 'kind' | 'sort'>>;

export const vehicleKeys = {
  all: ['vehicles'] as const,
  list: (filter: VehicleFilter) => ['vehicles', 'list', filter] as const,
  one: (id: string) => ['vehicles', 'one', id] as const,
};

/** By name unless asked otherwise. */
export function useVehicles(filter: VehicleFilter = {}) {
  return useQuery({
    queryKey: vehicleKeys.list(filter),
    queryFn: async ({ signal }) =>
      (await api<Page<Vehicle>>('/vehicles', { query: { ...filter, limit: 200 }, signal })).items,
    staleTime: STALE.slow,
  });
}

export function useVehicle(id: string) {
  return useQuery({
    queryKey: vehicleKeys.one(id),
    queryFn: ({ signal }) => api<Vehicle>(`/vehicles/${id}`, { signal }),
    enabled: id !== '',
  });
}

export function useCreateVehicle() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (input: VehicleInput) => api<Vehicle>('/vehicles', { method: 'POST', body: input }),
    onSuccess: () => client.invalidateQueries({ queryKey: vehicleKeys.all }),
  });
}

export function usePatchVehicle(id: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (patch: VehiclePatch) => api<Vehicle>(`/vehicles/${id}`, { method: 'PATCH', body: patch }),
    onSuccess: () => client.invalidateQueries({ queryKey: vehicleKeys.all }),
  });
}

export function useDeleteVehicle() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (id: string) => api<void>(`/vehicles/${id}`, { method: 'DELETE' }),
    onSuccess: async (_, id) => {
      client.removeQueries({ queryKey: vehicleKeys.one(id) });
      await client.invalidateQueries({ queryKey: vehicleKeys.all });
    },
  });
}
