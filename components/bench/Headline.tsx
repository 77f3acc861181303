import { StyleSheet, View } from 'react-native';
import { Figures } from '@/components/ui/Figures';
import { Text, type Tone } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { fonts, hairline, radius, space } from '@/constants/theme';
import { useDisplayUnits } from '@/hooks/preferences';
import { formatNumber } from '@/shared/format';
import { headlineFigures, type HeadlineFigure, type Verdict } from './headline';
import { useSummary, type Bench } from './use-bench';

export interface HeadlineProps {
  bench: Bench;
  /** Only the first so many, in one row: for the phone. */
  only?: readonly HeadlineFigure['key'][];
  columns: number;
}

/** The figures that decide, each with what it should be and its change against the baseline. */
export function Headline({ bench, only, columns }: HeadlineProps) {
  const { palette } = useTheme();
  const summary = useSummary(bench);
  const all = headlineFigures(summary, bench.baselineSummary, useDisplayUnits());
  const figures = only ? all.filter((figure) => only.includes(figure.key)) : all;
  return (
    <View
      role="region"
      aria-label="Headline figures"
      style={[styles.card, { backgroundColor: palette.sheet, borderColor: palette.rule }]}
    >
      {figures.map((figure) => (
        <View key={figure.key} style={[styles.figure, { width: `${100 / columns}%` }]}>
          <FigureView figure={figure} />
        </View>
      ))}
    </View>
  );
}

function FigureView({ figure }: { figure: HeadlineFigure }) {
  const tone = TONES[figure.verdict];
  return (
    <View>
      <Text variant="label" tone="soft" numberOfLines={1}>
        {figure.label}
      </Text>
      <Text variant="heading" level={0} tone={tone} style={styles.value}>
        {figure.value === null ? '–' : formatNumber(figure.value, figure.digits)}
        {figure.unit && figure.value !== null ? (
          <Text variant="small" tone="soft">{`\u202f${figure.unit}`}</Text>
        ) : null}
      </Text>
      {figure.change ? <Figures variant="small" tone="soft">{`${figure.change} vs baseline`}</Figures> : null}
      {figure.remark ? (
        <Figures variant="small" tone={figure.verdict === 'bad' ? 'vermilion' : 'soft'}>
          {figure.remark}
        </Figures>
      ) : null}
    </View>
  );
}

const TONES: Record<Verdict, Tone> = { good: 'pine', attention: 'ochre', bad: 'vermilion', plain: 'ink' };

const styles = StyleSheet.create({
  card: {
    flexDirection: 'row',
    flexWrap: 'wrap',
    borderWidth: hairline,
    borderRadius: radius,
    paddingHorizontal: space.xs,
    paddingVertical: space.xs,
  },
  figure: { padding: space.s },
  value: { fontFamily: fonts.number },
});
