/** Who is signed in, in which workspace, and what the role allows. */
import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { createContext, useContext } from 'react';
import type { Me, SignIn } from '@/shared/contracts/accounts';
import { can, type Permission, type Role } from '@/shared/contracts/roles';
import { ApiProblem, api, setApiWorkspace } from './api';
import { STALE } from './query-client';

export const sessionKeys = { me: ['me'] as const, installation: ['installation'] as const };

export interface Workspace {
  id: string;
  name: string;
  role: Role;
}

export interface Session {
  user: Me['user'];
  preferences: Me['preferences'];
  workspace: Workspace;
  workspaces: readonly Workspace[];
  switchWorkspace: (id: string) => void;
}

export const SessionContext = createContext<Session | null>(null);

/** How soon a page that could not even learn who is signed in asks again, ms. */
const ASK_AGAIN_MS = 3000;

/** GET /me; null when nobody is signed in. Nothing can be drawn without it, so it keeps asking until it is answered. */
export function useMe() {
  return useQuery({
    queryKey: sessionKeys.me,
    queryFn: fetchMe,
    staleTime: STALE.slow,
    refetchInterval: (query) => (query.state.status === 'error' ? ASK_AGAIN_MS : false),
  });
}

/** The session of a signed-in screen. */
export function useSession(): Session {
  const session = useContext(SessionContext);
  if (!session) throw new Error('useSession needs a signed-in screen around it.');
  return session;
}

/** Whether the role in the current workspace may do `permission`; the server enforces the same table. */
export function useCan(permission: Permission): boolean {
  return can(useSession().workspace.role, permission);
}

export function useSignIn() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (input: SignIn) => api<Me>('/sessions', { method: 'POST', body: input, anonymous: true }),
    onSuccess: () => client.invalidateQueries({ queryKey: sessionKeys.me }),
  });
}

export function useSignOut() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: () => api<void>('/sessions/current', { method: 'DELETE', anonymous: true }),
    onSettled: () => endSession(client, true),
  });
}

/** Forgets everything of the person who was signed in; `byChoice`: the next one begins at the first page. */
export function endSession(client: ReturnType<typeof useQueryClient>, byChoice = false) {
  setApiWorkspace(null);
  leftByChoice = byChoice;
  client.removeQueries({ predicate: (query) => !KEPT.includes(query.queryKey[0]) });
  client.setQueryData(sessionKeys.me, null);
}

/** Whether the last session was ended by its person, not by running out. */
export const wasLeftByChoice = (): boolean => leftByChoice;

let leftByChoice = false;
const KEPT: readonly unknown[] = [sessionKeys.me[0], sessionKeys.installation[0]];

async function fetchMe(): Promise<Me | null> {
  try {
    return await api<Me>('/me', { anonymous: true });
  } catch (error) {
    if (error instanceof ApiProblem && error.status === 401) return null;
    throw error;
  }
}
