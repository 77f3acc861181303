/** API tokens of the workspace. */
import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type { Page } from '@/shared/contracts/common';
import type { Token, TokenCreated, TokenCreateInput } from '@/shared/contracts/tokens';
import { api } from './api';

const KEY = ['tokens'] as const;

export const useTokens = () =>
  useQuery({
    queryKey: KEY,
    queryFn: async ({ signal }) => (await api<Page<Token>>('/tokens', { signal })).items,
  });

/** The answer holds the token itself, this once. */
export function useCreateToken() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (input: TokenCreateInput) => api<TokenCreated>('/tokens', { method: 'POST', body: input }),
    onSuccess: () => client.invalidateQueries({ queryKey: KEY }),
  });
}

export function useRevokeToken() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (id: string) => api<void>(`/tokens/${id}`, { method: 'DELETE' }),
    onSettled: () => client.invalidateQueries({ queryKey: KEY }),
  });
}
