import { memo } from 'react';
import Svg, { G, Path, Rect, Text as SvgText } from 'react-native-svg';
import { linearScale } from '@/components/charts/model/scale';
import { useTheme } from '@/components/ui/ThemeProvider';
import { fonts, typeScale } from '@/constants/theme';
import { correlationStems } from './correlation-stems';

export interface AutocorrelationChartProps {
  axes: readonly { label: string; tone: 'north' | 'east' | 'down'; values: readonly number[] }[];
  /** Half-width of the 95 % band. */
  band: number;
  lags: number;
  width: number;
  height: number;
}

/** Correlation of the innovations with themselves, a stem a lag and axis, over the band in which white ones stay. */
export const AutocorrelationChart = memo(function AutocorrelationChart(props: AutocorrelationChartProps) {
  const { axes, band, lags, width, height } = props;
  const { palette } = useTheme();
  const box = { left: 46, right: width - 10, top: 10, bottom: height - 40 };
  const { stems, low, high, ticks } = correlationStems({ axes, band, lags }, box);
  const y = linearScale([low, high], [box.bottom, box.top]);
  return (
    <Svg width={width} height={height}>
      <Rect
        x={box.left}
        y={y(band)}
        width={Math.max(0, box.right - box.left)}
        height={y(-band) - y(band)}
        fill={palette.pine}
        fillOpacity={0.1}
      />
      {ticks.map((tick) => (
        <G key={tick}>
          <Path d={`M${box.left} ${y(tick)}H${box.right}`} stroke={palette.rule} strokeWidth={1} />
          <SvgText
            x={box.left - 6}
            y={y(tick) + 4}
            textAnchor="end"
            fontSize={typeScale.small}
            fontFamily={fonts.number}
            fill={palette.inkSoft}
          >
            {String(tick).replace('-', '−')}
          </SvgText>
        </G>
      ))}
      <Path d={`M${box.left} ${y(band)}H${box.right}`} stroke={palette.pine} strokeWidth={1.25} />
      <Path d={`M${box.left} ${y(-band)}H${box.right}`} stroke={palette.pine} strokeWidth={1.25} />
      <Path d={`M${box.left} ${y(0)}H${box.right}`} stroke={palette.inkSoft} strokeWidth={1} />
      {stems.map((stem) => (
        <Path key={stem.tone} d={stem.path} stroke={palette[stem.tone]} strokeWidth={stem.widthPx} />
      ))}
      <LagLabels lags={lags} box={box} />
      <SvgText
        x={(box.left + box.right) / 2}
        y={height - 6}
        textAnchor="middle"
        fontSize={AXIS_PX}
        fontFamily={fonts.label}
        fill={palette.inkSoft}
      >
        lag, fixes
      </SvgText>
    </Svg>
  );
});

function LagLabels({ lags, box }: { lags: number; box: { left: number; right: number; bottom: number } }) {
  const { palette } = useTheme();
  const room = (box.right - box.left) / Math.max(1, lags);
  const marked = Array.from({ length: lags }, (_, i) => i + 1).filter((lag) => lag === 1 || lag % 5 === 0);
  return (
    <G>
      {marked.map((lag) => (
        <SvgText
          key={lag}
          x={box.left + room * (lag - 0.5)}
          y={box.bottom + 16}
          textAnchor="middle"
          fontSize={typeScale.small}
          fontFamily={fonts.number}
          fill={palette.inkSoft}
        >
          {lag}
        </SvgText>
      ))}
    </G>
  );
}

const AXIS_PX = 13;
