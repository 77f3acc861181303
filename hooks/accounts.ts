/** What one does without being signed in: the first admin, password reset, invitations. */
import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type {
  FirstAdmin,
  Installation,
  InvitationAccept,
  InvitationPreview,
  Me,
  PasswordReset,
} from '@/shared/contracts/accounts';
import { api } from './api';
import { STALE } from './query-client';
import { sessionKeys } from './session';

/** Whether the installation is new, whether the demo is there, where its mail goes. */
export function useInstallation() {
  return useQuery({
    queryKey: sessionKeys.installation,
    queryFn: () => api<Installation>('/installation', { anonymous: true }),
    staleTime: STALE.slow,
  });
}

export function useFirstAdmin() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (input: FirstAdmin) =>
      api<Me>('/installation/first-admin', { method: 'POST', body: input, anonymous: true }),
    onSuccess: async () => {
      await client.invalidateQueries({ queryKey: sessionKeys.me });
      await client.invalidateQueries({ queryKey: sessionKeys.installation });
    },
  });
}

export function useRequestReset() {
  return useMutation({
    mutationFn: (input: { email: string }) =>
      api<void>('/password-resets', { method: 'POST', body: input, anonymous: true }),
  });
}

export function useResetPassword() {
  return useMutation({
    mutationFn: (input: PasswordReset) =>
      api<void>('/password-resets/complete', { method: 'POST', body: input, anonymous: true }),
  });
}

/** Whose invitation a token is; the token comes from the mail's link. */
export function useInvitationPreview(token: string) {
  return useQuery({
    queryKey: ['invitation', token],
    queryFn: () => api<InvitationPreview>(`/invitations/${encodeURIComponent(token)}`, { anonymous: true }),
    enabled: token !== '',
  });
}

export function useAcceptInvitation(token: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (input: InvitationAccept) =>
      api<Me>(`/invitations/${encodeURIComponent(token)}/accept`, {
        method: 'POST',
        body: input,
        anonymous: true,
      }),
    onSuccess: () => client.invalidateQueries({ queryKey: sessionKeys.me }),
  });
}
