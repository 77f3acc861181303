import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { render } from '@testing-library/react-native';
import type { ReactElement, ReactNode } from 'react';
import { ThemeProvider } from '@/components/ui/ThemeProvider';
import { ToastProvider } from '@/components/ui/ToastProvider';
import { SessionContext, type Session } from '@/hooks/session';
import type { Role } from '@/shared/contracts/roles';

/** A signed-in person of the given role. */
export function sessionOf(role: Role): Session {
  const workspace = { id: '4f0c8a52-0f4e-4a1c-9a55-3d1f0f3b7e01', name: 'Harbour survey', role };
  return {
    user: { id: '4f0c8a52-0f4e-4a1c-9a55-3d1f0f3b7e02', email: 'maren@kelmar.test', name: 'Maren Holt' },
    workspace,
    workspaces: [workspace],
    switchWorkspace: () => undefined,
  };
}

/** Everything that a screen stands in, but the router. */
export function Around({ role = 'engineer', children }: { role?: Role; children: ReactNode }) {
  const client = new QueryClient({ defaultOptions: { queries: { retry: false, gcTime: Infinity } } });
  return (
    <ThemeProvider>
      <QueryClientProvider client={client}>
        <ToastProvider>
          <SessionContext.Provider value={sessionOf(role)}>{children}</SessionContext.Provider>
        </ToastProvider>
      </QueryClientProvider>
    </ThemeProvider>
  );
}

/** Renders `element` as a person of `role` sees it. */
export const renderAs = (element: ReactElement, role: Role = 'engineer') =>
  render(<Around role={role}>{element}</Around>);
