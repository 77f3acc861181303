/** How each kind of layer is inked. */
import type { Palette } from '@/shared/tokens';
import type { Inked } from '../figure/shapes';
import type { Layer } from './layers';

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
  const { stroke, strokeWidth = 1, strokeOpacity = 1, dash, round, fill, fillOpacity = 0 } = layerInk(layer);
  return {
    stroke: palette[stroke ?? layer.tone],
    strokeWidth,
    strokeOpacity,
    strokeDasharray: dash,
    strokeLinecap: round ? 'round' : 'butt',
    fill: fill ? palette[fill] : 'none',
    fillOpacity,
  };
}

/** The same by the palette's names. */
export function layerInk(layer: Layer): Inked {
  const { tone, opacity = 1 } = layer;
  const base: Inked = { stroke: tone, strokeWidth: 1.5, strokeOpacity: opacity };
  switch (layer.kind) {
    case 'line':
      return { ...base, strokeWidth: layer.width ?? 1.5, dash: layer.dash, round: !layer.dash };
    case 'band':
    case 'area':
      return {
        ...base,
        strokeWidth: 1,
        dash: layer.kind === 'band' ? layer.dash : undefined,
        strokeOpacity: 0.45 * opacity,
        fill: tone,
        fillOpacity: (layer.kind === 'band' ? 0.06 : 0.16) * opacity,
      };
    case 'dots':
      return { ...base, strokeWidth: 2.6, round: true };
    case 'diamonds':
      return base;
    case 'rules':
      return { ...base, strokeWidth: layer.width ?? 1.25, dash: layer.dash };
  }
}
