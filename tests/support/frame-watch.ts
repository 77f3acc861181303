/** What a page receives over the websocket of live runs. */
import type { Page } from 'playwright-core';

export class FrameWatch {
  /** Binary frames, and how many of them came before the summary of their run. */
  frames = 0;
  summaries = 0;
  failures = 0;
  /** Frames of the run that is coming in, not yet summed up. */
  private pending = 0;
  /** For each finished run, the frames that came before its summary. */
  readonly framesBeforeSummary: number[] = [];

  constructor(page: Page) {
    page.on('websocket', (socket) => socket.on('framereceived', ({ payload }) => this.take(payload)));
  }

  private take(payload: string | Buffer): void {
    if (typeof payload !== 'string') {
      this.frames++;
      this.pending++;
    } else if (payload.includes('"run:summary"')) {
      this.summaries++;
      this.framesBeforeSummary.push(this.pending);
      this.pending = 0;
    } else if (payload.includes('"run:failed"')) {
      this.failures++;
      this.pending = 0;
    }
  }
}
