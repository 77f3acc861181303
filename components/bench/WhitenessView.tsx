import { lazy, useMemo } from 'react';
import { Text } from '@/components/ui/Text';
import type { InnovationGroup } from './innovation-charts';
import { QuietFrame } from './QuietFrame';
import { useSummary, type Bench } from './use-bench';
import { whiteness, whitenessSentence, whitenessWords } from './whiteness-data';

// By dynamic import, with the other quiet charts: they stay out of the first chunk.
const AutocorrelationChart = lazy(async () => ({
  default: (await import('@/components/charts/quiet/quiet-charts')).AutocorrelationChart,
}));

export interface WhitenessViewProps {
  bench: Bench;
  group: InnovationGroup;
  height: number;
}

/** Whether a group's innovations are white: their autocorrelation over its 95 % band, and Ljung–Box. */
export function WhitenessView({ bench, group, height }: WhitenessViewProps) {
  const summary = useSummary(bench);
  const found = useMemo(() => whiteness(summary, group), [summary, group]);
  return (
    <QuietFrame
      title={`Autocorrelation, ${group}`}
      aside="95 % band in green"
      words={
        found
          ? whitenessSentence(found)
          : summary
            ? 'This group was not used, or too seldom to tell.'
            : 'No figures yet.'
      }
      height={height}
      legend={
        found ? (
          <Text variant="small" tone="soft">
            {`Ljung–Box over ${found.lags} lags: ${whitenessWords(found)}; small where they are not white`}
          </Text>
        ) : null
      }
    >
      {(width, room) => (found ? <AutocorrelationChart {...found} width={width} height={room} /> : null)}
    </QuietFrame>
  );
}
