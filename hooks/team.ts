/** Members, invitations and the local mail sink. */
import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type { Invitation, InvitationCreate, Member, SinkMessage } from '@/shared/contracts/accounts';
import type { Page } from '@/shared/contracts/common';
import type { Role } from '@/shared/contracts/roles';
import { api } from './api';

export const teamKeys = {
  members: ['team', 'members'] as const,
  invitations: ['team', 'invitations'] as const,
  mail: ['team', 'mail'] as const,
};

export function useMembers() {
  return useQuery({
    queryKey: teamKeys.members,
    queryFn: async ({ signal }) =>
      (await api<Page<Member>>('/members', { query: { limit: 200 }, signal })).items,
  });
}

export function usePatchMember() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ userId, role }: { userId: string; role: Role }) =>
      api<Member>(`/members/${userId}`, { method: 'PATCH', body: { role } }),
    onSettled: () => client.invalidateQueries({ queryKey: teamKeys.members }),
  });
}

export function useRemoveMember() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (userId: string) => api<void>(`/members/${userId}`, { method: 'DELETE' }),
    onSettled: () => client.invalidateQueries({ queryKey: teamKeys.members }),
  });
}

export function useInvitations() {
  return useQuery({
    queryKey: teamKeys.invitations,
    queryFn: async ({ signal }) =>
      (await api<Page<Invitation>>('/invitations', { query: { limit: 200 }, signal })).items,
  });
}

export function useInvite() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (input: InvitationCreate) => api<Invitation>('/invitations', { method: 'POST', body: input }),
    onSuccess: () => client.invalidateQueries({ queryKey: teamKeys.invitations }),
  });
}

export function useRevokeInvitation() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (id: string) => api<void>(`/invitations/${id}`, { method: 'DELETE' }),
    onSettled: () => client.invalidateQueries({ queryKey: teamKeys.invitations }),
  });
}

/** Messages that the local sink holds; admins only. */
export function useSinkMail() {
  return useQuery({
    queryKey: teamKeys.mail,
    queryFn: async ({ signal }) =>
      (await api<Page<SinkMessage>>('/mail', { query: { limit: 100 }, signal })).items,
    refetchInterval: 10_000,
  });
}
