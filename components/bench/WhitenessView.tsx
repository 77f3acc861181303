import { useMemo } from 'react';
import { StyleSheet, View } from 'react-native';
import { AutocorrelationChart } from '@/components/charts/quiet/AutocorrelationChart';
import { correlationSave } from '@/components/charts/quiet/quiet-saves';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { space } from '@/constants/theme';
import type { InnovationGroup } from './innovation-charts';
import { QuietFrame } from './QuietFrame';
import { useSummary, type Bench } from './use-bench';
import { axisWords, whiteness, whitenessSentence, type Whiteness } from './whiteness-data';

export interface WhitenessViewProps {
  bench: Bench;
  group: InnovationGroup;
  height: number;
}

/** Whether a group's innovations are white: their autocorrelation over its 95 % band, and Ljung–Box. */
export function WhitenessView({ bench, group, height }: WhitenessViewProps) {
  const summary = useSummary(bench);
  const found = useMemo(() => whiteness(summary, group), [summary, group]);
  const head = { title: `Autocorrelation, ${group}`, aside: '95 % band in green' };
  return (
    <QuietFrame
      {...head}
      words={
        found
          ? whitenessSentence(found)
          : summary
            ? 'This group was not used, or too seldom to tell.'
            : 'No figures yet.'
      }
      height={height}
      save={found && correlationSave(found, { ...head, sentence: whitenessSentence(found) })}
      legend={found ? <Legend found={found} /> : null}
    >
      {(width, room) => (found ? <AutocorrelationChart {...found} width={width} height={room} /> : null)}
    </QuietFrame>
  );
}

/** The axes as they stand at each lag, left to right, each with its portmanteau test. */
function Legend({ found }: { found: Whiteness }) {
  const { palette } = useTheme();
  return (
    <View style={styles.legend}>
      <Text variant="small" tone="soft">
        Ljung–Box, left to right:
      </Text>
      {found.axes.map((axis) => (
        <View key={axis.label} style={styles.entry}>
          <View style={[styles.swatch, { backgroundColor: palette[axis.tone] }]} />
          <Text variant="small" tone={axis.p !== null && axis.p < NOT_WHITE ? 'ochre' : 'soft'}>
            {axisWords(axis)}
          </Text>
        </View>
      ))}
    </View>
  );
}

/** White innovations fall below this in one run of a hundred. */
const NOT_WHITE = 0.01;

const styles = StyleSheet.create({
  legend: { flexDirection: 'row', flexWrap: 'wrap', columnGap: space.m },
  entry: { flexDirection: 'row', alignItems: 'center', gap: space.xs },
  swatch: { width: 4, height: 12 },
});
