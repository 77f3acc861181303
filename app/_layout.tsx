import { QueryClientProvider } from '@tanstack/react-query';
import { Slot } from 'expo-router';
import { StatusBar } from 'expo-status-bar';
import { useState } from 'react';
import { AppReady } from '@/components/layout/AppReady';
import { ThemeProvider } from '@/components/ui/ThemeProvider';
import { ToastProvider } from '@/components/ui/ToastProvider';
import { makeQueryClient } from '@/hooks/query-client';

export { RouteError as ErrorBoundary } from '@/components/layout/RouteError';

export default function RootLayout() {
  const [client] = useState(makeQueryClient);
  return (
    <ThemeProvider>
      <QueryClientProvider client={client}>
        <ToastProvider>
          <StatusBar style="auto" />
          <AppReady>
            <Slot />
          </AppReady>
        </ToastProvider>
      </QueryClientProvider>
    </ThemeProvider>
  );
}
