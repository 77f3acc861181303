import { memo } from 'react';
import { View } from 'react-native';
import Svg, { Path, Text as SvgText } from 'react-native-svg';
import { linePath } from '@/shared/charts/model/paths';
import { niceExtent } from '@/shared/charts/model/nice';
import { linearScale } from '@/shared/charts/model/scale';
import { useTheme } from '@/components/ui/ThemeProvider';
import { Text } from '@/components/ui/Text';
import { fonts, typeScale } from '@/constants/theme';
import { formatNumber } from '@/shared/format';
import type { Series } from '@/shared/contracts/recordings';
import { brokenAtGaps } from '../channel-content';

export interface MiniPlotProps {
  /** "Gyro x" */
  title: string;
  tone: 'north' | 'east' | 'down';
  channel: Series['channels'][number] | undefined;
  width: number;
}

/** One channel of the first rows: its shape and its range, with the unit. */
export const MiniPlot = memo(function MiniPlot({ title, tone, channel, width }: MiniPlotProps) {
  const { palette } = useTheme();
  const values = (channel?.values ?? []).filter((value) => value !== null);
  const unit = channel?.unit ?? '';
  const [low, high] = values.length > 0 ? [Math.min(...values), Math.max(...values)] : [0, 0];
  const known = channel !== undefined && values.length > 0;
  const words = known
    ? `${title} between ${formatNumber(low)} and ${formatNumber(high)} ${unit}`
    : `${title}: no values`;
  const domain = low === high ? ([low - 1, high + 1] as const) : niceExtent([low, high], 2);
  const y = linearScale(domain, [HEIGHT - 3, 3]);
  return (
    <View role="img" aria-label={words} style={{ width }}>
      <View aria-hidden style={{ flexDirection: 'row', justifyContent: 'space-between' }}>
        <Text variant="small" strong>
          {title}
        </Text>
        <Text variant="small" tone="soft">
          {unit}
        </Text>
      </View>
      <Svg width={width} height={HEIGHT} aria-hidden>
        {domain.map((value) => (
          <Path key={value} d={`M${LABEL_PX} ${y(value)}H${width}`} stroke={palette.rule} strokeWidth={1} />
        ))}
        {domain.map((value, at) => (
          <SvgText
            key={value}
            x={LABEL_PX - 4}
            y={at === 0 ? HEIGHT - 2 : 11}
            textAnchor="end"
            fontSize={typeScale.small - 1}
            fontFamily={fonts.number}
            fill={palette.inkSoft}
          >
            {formatNumber(value, 2)}
          </SvgText>
        ))}
        {known ? (
          <Path
            d={drawn(channel, width, y)}
            stroke={palette[tone]}
            strokeWidth={1}
            strokeLinejoin="round"
            fill="none"
          />
        ) : null}
      </Svg>
    </View>
  );
});

function drawn(channel: Series['channels'][number], width: number, y: (value: number) => number): string {
  const line = brokenAtGaps(channel);
  const x = linearScale([line.time[0]!, line.time[line.length - 1]!], [LABEL_PX, width]);
  return linePath({
    length: line.length,
    x: Float64Array.from({ length: line.length }, (_, i) => x(line.time[i]!)),
    y: Float64Array.from({ length: line.length }, (_, i) => y(line.at(i))),
  });
}

const HEIGHT = 56;
/** Room for the numbers at the left. */
const LABEL_PX = 38;
