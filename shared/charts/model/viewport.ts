/** What all charts of a bench share: the stretch of time in view and the cursor. A tiny store each, outside React. */
import type { Extent } from './scale';

type Listener = () => void;

/** Time in view, s. It never leaves the whole extent and never shrinks below `LEAST_SPAN_S`. */
export class Viewport {
  private extent: Extent;
  private view: Extent;
  private readonly listeners = new Set<Listener>();

  constructor(extent: Extent) {
    this.extent = extent;
    this.view = extent;
  }

  get current(): Extent {
    return this.view;
  }
  get whole(): Extent {
    return this.extent;
  }
  get zoomed(): boolean {
    return this.view[0] > this.extent[0] || this.view[1] < this.extent[1];
  }

  /** A new whole; a view that is not zoomed follows it. */
  setExtent(extent: Extent): void {
    if (extent[0] === this.extent[0] && extent[1] === this.extent[1]) return;
    const whole = !this.zoomed;
    this.extent = extent;
    this.show(whole ? extent : this.view);
  }

  /** Shows `[fromS, toS]`, moved and cut so that it fits. */
  show([fromS, toS]: Extent): void {
    const [low, high] = this.extent;
    const span = Math.min(high - low, Math.max(LEAST_SPAN_S, toS - fromS));
    const from = Math.min(high - span, Math.max(low, fromS));
    this.set([from, from + span]);
  }

  /** Zooms by `factor` (< 1: closer) with the time `aboutS` staying where it is. Answers whether anything changed. */
  zoom(factor: number, aboutS: number): boolean {
    const before = this.view;
    const [from, to] = before;
    this.show([aboutS - (aboutS - from) * factor, aboutS + (to - aboutS) * factor]);
    return this.view !== before;
  }

  pan(byS: number): void {
    this.show([this.view[0] + byS, this.view[1] + byS]);
  }

  reset(): void {
    this.set(this.extent);
  }

  subscribe = (listener: Listener): (() => void) => {
    this.listeners.add(listener);
    return () => this.listeners.delete(listener);
  };

  private set(view: Extent): void {
    if (view[0] === this.view[0] && view[1] === this.view[1]) return;
    this.view = view;
    for (const listener of this.listeners) listener();
  }
}

/** The time that every chart, the strip and the track read, s; null: nowhere. */
export class Cursor {
  private at: number | null = null;
  private readonly listeners = new Set<Listener>();

  get current(): number | null {
    return this.at;
  }

  set(timeS: number | null): void {
    if (timeS === this.at) return;
    this.at = timeS;
    for (const listener of this.listeners) listener();
  }

  subscribe = (listener: Listener): (() => void) => {
    this.listeners.add(listener);
    return () => this.listeners.delete(listener);
  };
}

/** The stretch that is being picked by a drag; null: none. */
export class Brush {
  private stretch: Extent | null = null;
  private readonly listeners = new Set<Listener>();

  get current(): Extent | null {
    return this.stretch;
  }

  set(stretch: Extent | null): void {
    this.stretch = stretch;
    for (const listener of this.listeners) listener();
  }

  subscribe = (listener: Listener): (() => void) => {
    this.listeners.add(listener);
    return () => this.listeners.delete(listener);
  };
}

/** Whether finer points of the stretch in view are on their way, have come, or could not. */
export type DetailState = 'held' | 'fetching' | 'failed';

export class Detail {
  private state: DetailState = 'held';
  private readonly listeners = new Set<Listener>();

  get current(): DetailState {
    return this.state;
  }

  set(state: DetailState): void {
    if (state === this.state) return;
    this.state = state;
    for (const listener of this.listeners) listener();
  }

  subscribe = (listener: Listener): (() => void) => {
    this.listeners.add(listener);
    return () => this.listeners.delete(listener);
  };
}

export const LEAST_SPAN_S = 0.5;
