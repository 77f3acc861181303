/** The zoomed stretch for those who fetch finer points of it, and what they say of it on all charts of the group. */
import { useEffect, useState } from 'react';
import type { ChartGroup } from './chart-group';
import type { Extent } from '@/shared/charts/model/scale';

/** A view that moves is waited for, ms. */
export const PAUSE_MS = 150;

/** The stretch in view once it stands still; null: the whole. Does not render while the view moves. */
export function useSettledView(group: ChartGroup): Extent | null {
  const [view, setView] = useState<Extent | null>(null);
  useEffect(() => {
    let timer: ReturnType<typeof setTimeout> | undefined;
    const settle = () => setView(group.viewport.zoomed ? group.viewport.current : null);
    const listen = () => {
      clearTimeout(timer);
      timer = setTimeout(settle, PAUSE_MS);
    };
    listen();
    const unsubscribe = group.viewport.subscribe(listen);
    return () => {
      clearTimeout(timer);
      unsubscribe();
    };
  }, [group]);
  return view;
}

/** Says in the charts' heads how it stands with the finer points; the coarse curve stays in any case. */
export function useDetailState(
  group: ChartGroup,
  { fetching, failed }: { fetching: boolean; failed: boolean },
) {
  useEffect(() => {
    group.detail.set(fetching ? 'fetching' : failed ? 'failed' : 'held');
  }, [group, fetching, failed]);
}
