/** Runs `update`; resolves after the frame that it asked for has been laid out and painted. */
export function painted(update: () => void): Promise<void> {
  return new Promise((resolve) => {
    update();
    requestAnimationFrame(() => {
      // A message is heard after this frame.
      const { port1, port2 } = new MessageChannel();
      port1.onmessage = () => resolve();
      port2.postMessage(null);
    });
  });
}
