import { StyleSheet, View } from 'react-native';
import { Text } from '@/components/ui/Text';
import { Toggle } from '@/components/ui/Toggle';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, space } from '@/constants/theme';
import type { Bench } from './use-bench';

/** What each run works out besides the filter. It changes no parameter, only what is reported. */
export function RunOptions({ bench }: { bench: Bench }) {
  const { palette } = useTheme();
  const { options } = bench.config;
  const locked = bench.locked !== null;
  return (
    <View role="group" aria-label="Each run" style={[styles.section, { borderTopColor: palette.rule }]}>
      <Text variant="label" strong level={3}>
        Each run
      </Text>
      <Toggle
        label="Smooth too"
        hint="fixed-interval smoother over the whole run: takes several times as long"
        value={options.smooth}
        onChange={(smooth) => bench.setOptions({ ...options, smooth })}
        disabled={locked}
      />
      <Toggle
        label="Error budget"
        hint="splits the predicted drift of each outage by its sources: takes several times as long"
        value={options.errorBudget}
        onChange={(errorBudget) => bench.setOptions({ ...options, errorBudget })}
        disabled={locked}
      />
    </View>
  );
}

const styles = StyleSheet.create({
  section: { gap: space.s, borderTopWidth: hairline, paddingTop: space.m },
});
