/** Letters that have not left yet; admins only. */
import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type { QueuedLetter } from '@/shared/contracts/accounts';
import type { Page } from '@/shared/contracts/common';
import { api } from './api';

const KEY = ['team', 'mail', 'queue'] as const;

export function useMailQueue() {
  return useQuery({
    queryKey: KEY,
    queryFn: async ({ signal }) =>
      (await api<Page<QueuedLetter>>('/mail/queue', { query: { limit: 100 }, signal })).items,
    refetchInterval: 5_000,
  });
}

/** The letter's id; null: all that have not left. */
export function useRetryMail() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (id: string | null) =>
      api<void>('/mail/queue/retry', { method: 'POST', body: id ? { id } : {} }),
    onSettled: () => client.invalidateQueries({ queryKey: KEY }),
  });
}
