import { Suspense, type ReactNode } from 'react';
import { SkeletonList } from '@/components/ui/Skeleton';
import { Screen } from './Screen';

export interface ScreenPendingProps {
  /** Of the screen that is coming. */
  title: string;
  children: ReactNode;
}

/** Holds the place of a screen whose code is still being fetched. */
export function ScreenPending({ title, children }: ScreenPendingProps) {
  return (
    <Suspense
      fallback={
        <Screen title={title}>
          <SkeletonList label={title} rows={3} />
        </Screen>
      }
    >
      {children}
    </Suspense>
  );
}
