/** The verification matrix of a version: as it stands, starting it, waiving a cell. */
import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type { Verification, WaiverCreate } from '@/shared/contracts/verification';
import { api } from './api';
import { setKeys } from './parameter-sets';
import type { VersionRef } from './versions';

const key = ({ setId, number }: VersionRef) => [...setKeys.all, 'verification', setId, number] as const;
const path = ({ setId, number }: VersionRef) => `/parameter-sets/${setId}/versions/${number}`;

/** How soon the matrix is asked for again while its runs go, ms. */
const ASK_AGAIN_MS = 1000;

export const useVerification = (of: VersionRef) =>
  useQuery({
    queryKey: key(of),
    queryFn: ({ signal }) => api<Verification>(`${path(of)}/verification`, { signal }),
    refetchInterval: ({ state }) => (state.data?.state === 'going' ? ASK_AGAIN_MS : false),
  });

/** Queues the runs that are missing, or whose inputs have changed. */
export function useVerify(of: VersionRef) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: () => api<Verification>(`${path(of)}/verify`, { method: 'POST' }),
    onSuccess: (verification) => client.setQueryData(key(of), verification),
  });
}

export function useWaive(of: VersionRef) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: WaiverCreate) => api<Verification>(`${path(of)}/waivers`, { method: 'POST', body }),
    onSuccess: (verification) => client.setQueryData(key(of), verification),
  });
}
