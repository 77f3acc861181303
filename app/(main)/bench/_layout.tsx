import { Slot } from 'expo-router';

export { RouteError as ErrorBoundary } from '@/components/layout/RouteError';

/** One bench at a time: no stack keeps an older one running behind it. */
export default function BenchLayout() {
  return <Slot />;
}
