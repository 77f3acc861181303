import { memo } from 'react';
import Svg, { G, Path, Rect, Text as SvgText } from 'react-native-svg';
import { hatchPath } from '@/components/charts/model/hatch';
import { useTheme } from '@/components/ui/ThemeProvider';
import { fonts, typeScale } from '@/constants/theme';
import { formatNumber } from '@/shared/format';
import { budgetLayout, type BudgetBar, type BudgetBox } from './budget-layout';
import { sourceInk } from './source-ink';

export interface BudgetChartProps {
  columns: readonly { afterS: number; totalM: number; shares: readonly number[] }[];
  width: number;
  height: number;
}

/** Shares of the predicted variance, a column a drift point, the total's 1σ above each. */
export const BudgetChart = memo(function BudgetChart({ columns, width, height }: BudgetChartProps) {
  const { palette } = useTheme();
  const box = { left: 46, right: width - 10, top: 26, bottom: height - 40 };
  const layout = budgetLayout(columns, box);
  return (
    <Svg width={width} height={height}>
      <Percent box={box} />
      {layout.map((column, i) => (
        <G key={columns[i]!.afterS}>
          {column.bars.map((bar) => (
            <Bar key={bar.source} bar={bar} x={column.x} width={column.width} />
          ))}
          <SvgText
            x={column.x + column.width / 2}
            y={box.top - 8}
            textAnchor="middle"
            fontSize={typeScale.small}
            fontFamily={fonts.number}
            fill={palette.ink}
          >
            {`${formatNumber(columns[i]!.totalM)} m`}
          </SvgText>
          <SvgText
            x={column.x + column.width / 2}
            y={box.bottom + 16}
            textAnchor="middle"
            fontSize={typeScale.small}
            fontFamily={fonts.number}
            fill={palette.inkSoft}
          >
            {Number(columns[i]!.afterS.toFixed(1))}
          </SvgText>
        </G>
      ))}
      <SvgText
        x={(box.left + box.right) / 2}
        y={height - 6}
        textAnchor="middle"
        fontSize={AXIS_PX}
        fontFamily={fonts.label}
        fill={palette.inkSoft}
      >
        s without GNSS
      </SvgText>
    </Svg>
  );
});

function Percent({ box }: { box: BudgetBox }) {
  const { palette } = useTheme();
  return (
    <G>
      {[0, 50, 100].map((percent) => {
        const y = box.bottom - ((box.bottom - box.top) * percent) / 100;
        return (
          <G key={percent}>
            <Path d={`M${box.left} ${y}H${box.right}`} stroke={palette.rule} strokeWidth={1} />
            <SvgText
              x={box.left - 6}
              y={y + 4}
              textAnchor="end"
              fontSize={typeScale.small}
              fontFamily={fonts.number}
              fill={palette.inkSoft}
            >
              {percent === 100 ? '100 %' : percent}
            </SvgText>
          </G>
        );
      })}
    </G>
  );
}

function Bar({ bar, x, width }: { bar: BudgetBar; x: number; width: number }) {
  const { palette } = useTheme();
  const { tone, hatched } = sourceInk(bar.source);
  if (bar.height < 0.5) return null;
  return (
    <G>
      <Rect x={x} y={bar.y} width={width} height={bar.height} fill={palette.sheet} />
      <Rect
        x={x}
        y={bar.y}
        width={width}
        height={bar.height}
        fill={palette[tone]}
        fillOpacity={hatched ? 0.16 : 0.72}
        stroke={palette.sheet}
        strokeWidth={1}
      />
      {hatched ? (
        <Path d={hatchPath(x, bar.y, width, bar.height, 6)} stroke={palette[tone]} strokeWidth={1.25} />
      ) : null}
    </G>
  );
}

const AXIS_PX = 13;
