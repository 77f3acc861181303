import { useEffect, useState } from 'react';

/** Calls back once `delayMs` have passed without another call; never after the component is gone. */
export function useDelayedCall(delayMs = 250): (call: () => void) => void {
  const [delay] = useState(() => new Delay());
  useEffect(() => () => delay.stop(), [delay]);
  return (call) => delay.start(call, delayMs);
}

class Delay {
  private timer: ReturnType<typeof setTimeout> | undefined;

  start(call: () => void, delayMs: number): void {
    this.stop();
    this.timer = setTimeout(call, delayMs);
  }

  stop(): void {
    clearTimeout(this.timer);
  }
}
