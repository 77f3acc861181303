/** When to stop: a signal, or the end of the npm that started us. */

const STOP_SIGNALS = ['SIGINT', 'SIGTERM', 'SIGHUP'] as const;
const PARENT_POLL_MS = 500;

/** Aborted by the first request to stop, after `onStop`; a second signal does not wait for anybody. */
export function stopSignal(onStop: () => void = () => undefined): AbortSignal {
  const controller = new AbortController();
  const stop = () => {
    if (controller.signal.aborted) return;
    onStop();
    controller.abort();
  };
  for (const signal of STOP_SIGNALS) {
    process.on(signal, () => {
      if (controller.signal.aborted) process.exit(130);
      stop();
    });
  }
  if (process.env.npm_lifecycle_event) watchParent(stop);
  return controller.signal;
}

/** npm passes a signal on to a shell, which ends without passing it on to us; but then our parent is another one. */
function watchParent(stop: () => void): void {
  const parent = process.ppid;
  const timer = setInterval(() => {
    if (process.ppid === parent) return;
    clearInterval(timer);
    stop();
  }, PARENT_POLL_MS);
  timer.unref();
}
