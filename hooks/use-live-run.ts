/** The live run of an open bench, for React: state through an external store, curves outside it. */
import { useQueryClient } from '@tanstack/react-query';
import { useEffect, useState, useSyncExternalStore } from 'react';
import { LiveController, type LiveState } from './live/live-controller';
import { openSocketTransport } from './live/socket-transport';
import { runKeys } from './runs';

/** A controller that lives as long as the component. */
export function useLiveRun(): LiveController {
  const [controller] = useState(() => new LiveController(openSocketTransport));
  const client = useQueryClient();
  useEffect(() => {
    const close = controller.open();
    const unsubscribe = controller.subscribe(() => {
      if (controller.state.phase === 'done') void client.invalidateQueries({ queryKey: runKeys.lists });
    });
    return () => {
      unsubscribe();
      close();
    };
  }, [client, controller]);
  return controller;
}

/**
 * A part of the controller's state; renders when that part changes. `select` picks a value or an object of the state
 * itself: something made anew at each call would render for ever.
 */
export function useLive<T>(controller: LiveController, select: (state: LiveState) => T): T {
  return useSyncExternalStore(controller.subscribe, () => select(controller.getState()));
}
