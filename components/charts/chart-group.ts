/** Charts that share time, cursor and redraws: what changes raises a flag, one animation callback draws all that is flagged. */
import { Brush, Cursor, Detail, Viewport } from '@/shared/charts/model/viewport';
import type { Extent } from '@/shared/charts/model/scale';

type Draw = () => void;

export class ChartGroup {
  readonly viewport: Viewport;
  readonly cursor = new Cursor();
  readonly brush = new Brush();
  readonly detail = new Detail();
  private readonly charts = new Set<Draw>();
  private readonly dirty = new Set<Draw>();
  private frame: number | null = null;
  /** Redraws so far; for tests and measurements. */
  draws = 0;

  constructor(extent: Extent) {
    this.viewport = new Viewport(extent);
    this.viewport.subscribe(() => this.invalidate());
  }

  /** Registers a chart's drawing; it is drawn with the next frame. */
  add(draw: Draw): () => void {
    this.charts.add(draw);
    this.invalidate(draw);
    return () => {
      this.charts.delete(draw);
      this.dirty.delete(draw);
    };
  }

  /** Flags one chart, or all. Any number of calls before the next animation frame make one redraw. */
  invalidate = (draw?: Draw): void => {
    if (draw) this.dirty.add(draw);
    else for (const chart of this.charts) this.dirty.add(chart);
    this.frame ??= requestAnimationFrame(this.flush);
  };

  private flush = (): void => {
    this.frame = null;
    this.draws++;
    const flagged = [...this.dirty];
    this.dirty.clear();
    for (const draw of flagged) draw();
  };
}
