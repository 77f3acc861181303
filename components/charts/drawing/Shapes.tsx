import { memo } from 'react';
import { G, Path, Rect, Text as SvgText } from 'react-native-svg';
import { useTheme } from '@/components/ui/ThemeProvider';
import { fonts, type Palette } from '@/constants/theme';
import type { Inked, Shape } from '@/shared/charts/figure/shapes';

const FACES = { label: fonts.label, strong: fonts.labelStrong, number: fonts.number } as const;

/** Draws shapes in the palette of the screen. */
export const Shapes = memo(function Shapes({ shapes }: { shapes: readonly Shape[] }) {
  const { palette } = useTheme();
  return (
    <G>
      {shapes.map((shape, i) => (
        <Drawn key={i} shape={shape} palette={palette} />
      ))}
    </G>
  );
});

/** The ink as react-native-svg takes it. */
export function svgInk(ink: Inked, palette: Palette) {
  return {
    stroke: ink.stroke ? palette[ink.stroke] : 'none',
    strokeWidth: ink.strokeWidth ?? 1,
    strokeOpacity: ink.strokeOpacity ?? 1,
    strokeDasharray: ink.dash,
    strokeLinecap: ink.round ? ('round' as const) : ('butt' as const),
    strokeLinejoin: 'round' as const,
    fill: ink.fill ? palette[ink.fill] : 'none',
    fillOpacity: ink.fillOpacity ?? 1,
  };
}

function Drawn({ shape, palette }: { shape: Shape; palette: Palette }) {
  if (shape.kind === 'path') return <Path d={shape.d} {...svgInk(shape, palette)} />;
  if (shape.kind === 'rect') {
    const { x, y, width, height } = shape;
    return <Rect x={x} y={y} width={width} height={height} {...svgInk(shape, palette)} />;
  }
  return (
    <SvgText
      x={shape.x}
      y={shape.y}
      textAnchor={shape.anchor ?? 'start'}
      fontSize={shape.size}
      fontFamily={FACES[shape.face]}
      fill={palette[shape.tone]}
    >
      {shape.text}
    </SvgText>
  );
}
