/** How the quiet charts' axes are inked: as the live ones. */
import { fonts, typeScale, type Palette } from '@/constants/theme';

export const QUIET_PADDING = { left: 56, right: 14, top: 12, bottom: 44 };

/** Axis style in `palette`; the value axis carries the grid. */
export function quietAxis(palette: Palette, dependent: boolean) {
  return {
    axis: { stroke: dependent ? 'none' : palette.inkSoft, strokeWidth: 1 },
    grid: { stroke: dependent ? palette.rule : 'none', strokeWidth: 1, strokeDasharray: '' },
    ticks: { stroke: dependent ? 'none' : palette.inkSoft, size: 4 },
    tickLabels: { fontFamily: fonts.number, fontSize: typeScale.small, fill: palette.inkSoft, padding: 4 },
    axisLabel: {
      fontFamily: fonts.label,
      fontSize: 13,
      fill: palette.inkSoft,
      padding: dependent ? 40 : 26,
    },
  };
}
