import { MainTabs } from '@/components/layout/MainTabs';
import { SessionGate } from '@/components/layout/SessionGate';

export { RouteError as ErrorBoundary } from '@/components/layout/RouteError';

export default function MainLayout() {
  return (
    <SessionGate>
      <MainTabs />
    </SessionGate>
  );
}
