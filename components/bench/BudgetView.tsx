import { useMemo } from 'react';
import { StyleSheet, View } from 'react-native';
import Svg, { Path, Rect } from 'react-native-svg';
import { hatchPath } from '@/shared/charts/model/hatch';
import { BudgetChart } from '@/components/charts/quiet/BudgetChart';
import { budgetSave } from '@/components/charts/quiet/quiet-saves';
import { sourceInk } from '@/components/charts/quiet/source-ink';
import { Button } from '@/components/ui/Button';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { space } from '@/constants/theme';
import { formatNumber } from '@/shared/format';
import { errorBudget, type Budget } from './budget-data';
import { QuietFrame } from './QuietFrame';
import { useSummary, type Bench } from './use-bench';

export interface BudgetViewProps {
  bench: Bench;
  direction: 'horizontal' | 'vertical';
  height: number;
}

/** Which source contributes how much of the predicted drift. */
export function BudgetView({ bench, direction, height }: BudgetViewProps) {
  const summary = useSummary(bench);
  const budget = useMemo(() => errorBudget(summary, direction), [summary, direction]);
  const head = { title: `Error budget, ${direction}`, aside: 'share of variance, 1σ above' };
  return (
    <QuietFrame
      {...head}
      words={budget ? budgetWords(budget) : 'The runs so far were not split by their sources.'}
      height={height}
      save={budget && budgetSave(budget, { ...head, sentence: budgetWords(budget) })}
      legend={budget ? <Legend sources={budget.sources} /> : null}
    >
      {(width, room) =>
        budget ? <BudgetChart columns={budget.columns} width={width} height={room} /> : null
      }
    </QuietFrame>
  );
}

/** Whether runs are split, or the one on screen was. */
export function useSplit(bench: Bench): boolean {
  const summary = useSummary(bench);
  return bench.config.options.errorBudget || errorBudget(summary, 'horizontal') !== null;
}

/** In place of the budget while runs are not split. */
export function BudgetOff({ bench }: { bench: Bench }) {
  const { options } = bench.config;
  return (
    <View style={styles.off}>
      <Text variant="body" strong align="center">
        Runs are not split by their sources
      </Text>
      <Text variant="label" tone="soft" align="center">
        The error budget shows how much of the predicted drift comes from gyro noise, biases, GNSS and the
        start. It makes each run take several times as long.
      </Text>
      {bench.locked === null ? (
        <Button label="Split each run" onPress={() => bench.setOptions({ ...options, errorBudget: true })} />
      ) : null}
    </View>
  );
}

function Legend({ sources }: { sources: readonly string[] }) {
  return (
    <View style={styles.legend}>
      {sources.map((source, rank) => (
        <View key={source} style={styles.entry}>
          <Swatch rank={rank} />
          <Text variant="small" tone="soft">
            {source}
          </Text>
        </View>
      ))}
    </View>
  );
}

function Swatch({ rank }: { rank: number }) {
  const { palette } = useTheme();
  const { tone, hatched } = sourceInk(rank);
  return (
    <Svg width={SWATCH_PX} height={SWATCH_PX} aria-hidden>
      <Rect width={SWATCH_PX} height={SWATCH_PX} fill={palette[tone]} fillOpacity={hatched ? 0.16 : 0.72} />
      {hatched ? (
        <Path d={hatchPath(0, 0, SWATCH_PX, SWATCH_PX, 6)} stroke={palette[tone]} strokeWidth={1.25} />
      ) : null}
    </Svg>
  );
}

/** "After 60 s 12.3 m (1σ): gyro bias 61 %, initial attitude 30 %, others 9 %." */
export function budgetWords({ sources, columns }: Budget): string {
  return columns
    .map(({ afterS, totalM, shares }) => {
      const parts = sources.map((source, i) => `${source} ${Math.round(100 * shares[i]!)} %`);
      return `After ${formatNumber(afterS)} s ${formatNumber(totalM)} m (1σ): ${parts.join(', ')}.`;
    })
    .join(' ');
}

const SWATCH_PX = 12;

const styles = StyleSheet.create({
  off: { padding: space.xxl, gap: space.m, alignItems: 'center', maxWidth: 480, alignSelf: 'center' },
  legend: { flexDirection: 'row', flexWrap: 'wrap', columnGap: space.m },
  entry: { flexDirection: 'row', alignItems: 'center', gap: space.xs },
});
