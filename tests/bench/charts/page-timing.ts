/** Timing inside a page: what an update costs the main thread, from its animation frame until after layout and painting. */

export interface UpdateTimes {
  /** Main thread, each update, ms. */
  millis: number[];
  /** Tasks of more than 50 ms meanwhile, ms. */
  longTasks: number[];
}

/** Runs `update` every `everyMs`, `count` times. */
export async function measured(count: number, everyMs: number, update: () => void): Promise<UpdateTimes> {
  const longTasks: number[] = [];
  const stop = onLongTask((duration) => longTasks.push(duration));
  const millis: number[] = [];
  for (let i = 0; i < count; i++) {
    const begun = performance.now();
    millis.push(await mainThreadOf(update));
    await new Promise((resolve) => setTimeout(resolve, Math.max(0, everyMs - (performance.now() - begun))));
  }
  stop();
  return { millis, longTasks };
}

/** The update itself, then its frame: what was asked for in it is drawn between the two marks. */
function mainThreadOf(update: () => void): Promise<number> {
  return new Promise((resolve) => {
    const begun = performance.now();
    let frameAt = 0;
    requestAnimationFrame(() => (frameAt = performance.now()));
    update();
    const own = performance.now() - begun;
    requestAnimationFrame(() => {
      // A message is heard after this frame has been laid out and painted.
      const { port1, port2 } = new MessageChannel();
      port1.onmessage = () => resolve(own + performance.now() - frameAt);
      port2.postMessage(null);
    });
  });
}

/** Calls back with each task of more than 50 ms; answers a function that stops. */
export function onLongTask(tell: (durationMs: number) => void): () => void {
  const observer = new PerformanceObserver((list) => {
    for (const entry of list.getEntries()) tell(entry.duration);
  });
  observer.observe({ type: 'longtask' });
  return () => observer.disconnect();
}
