import { useQueryClient } from '@tanstack/react-query';
import { Redirect } from 'expo-router';
import { useEffect, useMemo, useState, type ReactNode } from 'react';
import { View } from 'react-native';
import { space } from '@/constants/theme';
import { Notice } from '@/components/ui/Notice';
import { setApiWorkspace, setSignedOutHandler } from '@/hooks/api';
import { endSession, SessionContext, useMe, wasLeftByChoice, type Session } from '@/hooks/session';
import { signInPath } from './next-path';
import { hrefOf } from './paths';

const STORAGE_KEY = 'driftwright.workspace';

/** Lets the signed-in through and gives them their session; everybody else signs in first and comes back here. */
export function SessionGate({ children }: { children: ReactNode }) {
  const me = useMe();
  const client = useQueryClient();
  const [chosen, setChosen] = useState<string | null>(storedWorkspace);
  useEffect(() => setSignedOutHandler(() => endSession(client)), [client]);

  const person = me.data;
  const workspace = person?.workspaces.find((w) => w.id === chosen) ?? person?.workspaces[0];
  // Before the children's first request, hence not in an effect.
  setApiWorkspace(workspace?.id ?? null);
  const session = useMemo<Session | null>(() => {
    if (!person || !workspace) return null;
    return {
      user: person.user,
      preferences: person.preferences,
      workspace,
      workspaces: person.workspaces,
      switchWorkspace: (id) => {
        storeWorkspace(id);
        setApiWorkspace(id);
        setChosen(id);
        client.removeQueries({ predicate: (query) => query.queryKey[0] !== 'me' });
      },
    };
  }, [person, workspace, client]);

  if (!person) return <ToSignIn />;
  if (!session)
    return (
      <Waiting>
        <Notice tone="ochre" title="No workspace yet">
          You belong to no workspace. Ask an admin to invite you again.
        </Notice>
      </Waiting>
    );
  return <SessionContext.Provider value={session}>{children}</SessionContext.Provider>;
}

function Waiting({ children }: { children: ReactNode }) {
  return (
    <View role="main" style={{ padding: space.xl, maxWidth: 720, width: '100%', alignSelf: 'center' }}>
      {children}
    </View>
  );
}

/** Read from the address itself and once: the router's own path changes as soon as the page is not drawn. */
function ToSignIn() {
  const [from] = useState(() => (wasLeftByChoice() ? '/' : location.pathname + location.search));
  return <Redirect href={hrefOf(signInPath(from))} />;
}

function storedWorkspace(): string | null {
  try {
    return globalThis.localStorage?.getItem(STORAGE_KEY) ?? null;
  } catch {
    return null;
  }
}
function storeWorkspace(id: string) {
  try {
    globalThis.localStorage?.setItem(STORAGE_KEY, id);
  } catch {
    // storage may be forbidden: the first workspace is then taken at the next load
  }
}
