/** The little of react-dom that the charts' bench mounts its page with; the client itself goes through Expo. */
declare module 'react-dom/client' {
  import type { ReactNode } from 'react';
  export function createRoot(element: Element): { render: (node: ReactNode) => void };
}
