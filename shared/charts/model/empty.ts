/** Whether a chart has anything to draw, and what it says where not. Pure. */
import type { ChartContent, Layer } from './layers';

/** Words in place of the plot; '' where there is something to draw. */
export function emptyWords(content: ChartContent): string {
  if (content.layers.some(hasPoint)) return '';
  return content.empty?.() || 'Nothing to draw yet.';
}

/** Rules alone, bounds of values that do not come, are no chart. */
function hasPoint(layer: Layer): boolean {
  if (layer.kind === 'rules') return false;
  const series = layer.series();
  if (!series) return false;
  for (let i = 0; i < series.length; i++) if (Number.isFinite(series.at(i))) return true;
  return false;
}
