/** What a chart's legend says: which layers, in which order, and the mark before each name. */
import type { Layer } from './layers';

/** Lines first and in the order of their axes, whatever lies on top of what; then grounds, marks and rules. */
export function legendOrder(layers: readonly Layer[]): Layer[] {
  const axes = ['N', 'E', 'D'];
  const kinds: Layer['kind'][] = ['line', 'dots', 'band', 'area', 'diamonds', 'rules'];
  const rank = ({ kind, tone, label = '' }: Layer) =>
    kinds.indexOf(kind) * 10 + (tone === 'ghost' ? 5 : Math.max(0, axes.indexOf(label)));
  return layers.filter((layer) => layer.label !== undefined).sort((a, b) => rank(a) - rank(b));
}

/** Stroke of a sample, 18 × 10 px. */
export function samplePath(kind: Layer['kind']): string {
  if (kind === 'dots') return 'M3 5h0M8 3h0M13 6h0';
  return kind === 'diamonds' ? 'M8 1l4 4l-4 4l-4 -4Z' : 'M0 5H18';
}
