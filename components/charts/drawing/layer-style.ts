/** How each kind of layer is inked. */
import type { Palette } from '@/constants/theme';
import type { Layer } from '../model/layers';

export interface Ink {
  stroke: string;
  strokeWidth: number;
  strokeOpacity: number;
  strokeDasharray?: string;
  strokeLinecap: 'round' | 'butt';
  fill: string;
  fillOpacity: number;
}

/** Ink of `layer` in `palette`. */
export function inkOf(layer: Layer, palette: Palette): Ink {
  const colour = palette[layer.tone];
  const base: Ink = {
    stroke: colour,
    strokeWidth: 1.5,
    strokeOpacity: layer.opacity ?? 1,
    strokeLinecap: 'butt',
    fill: 'none',
    fillOpacity: 0,
  };
  switch (layer.kind) {
    case 'line':
      return {
        ...base,
        strokeWidth: layer.width ?? 1.5,
        strokeDasharray: layer.dash,
        strokeLinecap: layer.dash ? 'butt' : 'round',
      };
    case 'band':
    case 'area':
      return {
        ...base,
        strokeWidth: 1,
        strokeDasharray: layer.kind === 'band' ? layer.dash : undefined,
        strokeOpacity: 0.45 * (layer.opacity ?? 1),
        fill: colour,
        fillOpacity: (layer.kind === 'band' ? 0.06 : 0.16) * (layer.opacity ?? 1),
      };
    case 'dots':
      return { ...base, strokeWidth: 2.6, strokeLinecap: 'round' };
    case 'diamonds':
      return { ...base, strokeWidth: 1.5 };
    case 'rules':
      return { ...base, strokeWidth: layer.width ?? 1.25, strokeDasharray: layer.dash };
  }
}
