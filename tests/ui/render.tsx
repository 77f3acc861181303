import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { render } from '@testing-library/react-native';
import { useState, type ReactElement, type ReactNode } from 'react';
import { ThemeProvider } from '@/components/ui/ThemeProvider';
import { ToastProvider } from '@/components/ui/ToastProvider';
import { SessionContext, type Session } from '@/hooks/session';
import { HINTS, type Preferences } from '@/shared/contracts/preferences';
import type { Role } from '@/shared/contracts/roles';

/** A signed-in person of the given role. */
export function sessionOf(role: Role, preferences: Partial<Preferences> = {}): Session {
  const workspace = { id: '4f0c8a52-0f4e-4a1c-9a55-3d1f0f3b7e01', name: 'Harbour survey', role };
  return {
    user: { id: '4f0c8a52-0f4e-4a1c-9a55-3d1f0f3b7e02', email: 'maren@kelmar.test', name: 'Maren Holt' },
    preferences: { units: {}, letters: {}, hintsSeen: [...HINTS], ...preferences },
    workspace,
    workspaces: [workspace],
    switchWorkspace: () => undefined,
  };
}

/** Everything that a screen stands in, but the router. */
export function Around({
  role = 'engineer',
  preferences,
  children,
}: {
  role?: Role;
  preferences?: Partial<Preferences>;
  children: ReactNode;
}) {
  // Without their timers, which would keep jest alive for minutes after the last test.
  const [client] = useState(
    () =>
      new QueryClient({
        defaultOptions: { queries: { retry: false, gcTime: Infinity }, mutations: { gcTime: Infinity } },
      }),
  );
  return (
    <ThemeProvider>
      <QueryClientProvider client={client}>
        <ToastProvider>
          <SessionContext.Provider value={sessionOf(role, preferences)}>{children}</SessionContext.Provider>
        </ToastProvider>
      </QueryClientProvider>
    </ThemeProvider>
  );
}

/** Renders `element` as a person of `role` sees it; hints have been read unless `preferences` say otherwise. */
export const renderAs = (
  element: ReactElement,
  role: Role = 'engineer',
  preferences: Partial<Preferences> = {},
) => render(<Around {...{ role, preferences }}>{element}</Around>);
