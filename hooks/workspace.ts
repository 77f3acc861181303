/** The workspace as a whole, and where one is signed in. */
import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type { SignedInSession } from '@/shared/contracts/accounts';
import type { Page } from '@/shared/contracts/common';
import { api, downloadUrl } from './api';
import { sessionKeys } from './session';

const SESSIONS = ['sessions'] as const;

export const useSignedIn = () =>
  useQuery({
    queryKey: SESSIONS,
    queryFn: async ({ signal }) => (await api<Page<SignedInSession>>('/sessions', { signal })).items,
  });

/** One session, or with null all but the one that asks. */
export function useEndSessions() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (id: string | null) =>
      api<void>(id === null ? '/sessions' : `/sessions/${id}`, { method: 'DELETE' }),
    onSettled: () => client.invalidateQueries({ queryKey: SESSIONS }),
  });
}

/** Who left or deleted a workspace finds themselves in what is left. */
function useParting<I>(send: (input: I) => Promise<void>) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: send,
    onSuccess: async () => {
      await client.invalidateQueries({ queryKey: sessionKeys.me });
      client.removeQueries({ predicate: ({ queryKey }) => queryKey[0] !== sessionKeys.me[0] });
    },
  });
}

export const useLeaveWorkspace = () =>
  useParting<void>(() => api<void>('/workspace/leave', { method: 'POST', body: { confirm: true } }));
export const useDeleteWorkspace = () =>
  useParting<string>((name) => api<void>('/workspace/delete', { method: 'POST', body: { name } }));

/** Address of all data of the workspace as one archive. */
export const workspaceExportUrl = (): string => downloadUrl('/workspace/export.tar');
