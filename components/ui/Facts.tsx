import type { ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { hairline, space } from '@/constants/theme';
import { Figures } from './Figures';
import { Text } from './Text';
import { useTheme } from './ThemeProvider';

export interface Fact {
  label: string;
  /** A string has its digits set in mono. */
  value: ReactNode;
}

/** Label and value in ruled rows. */
export function Facts({ facts }: { facts: readonly Fact[] }) {
  const { palette } = useTheme();
  return (
    <View>
      {facts.map((fact, at) => (
        <View
          key={fact.label}
          style={[styles.row, at > 0 ? { borderTopWidth: hairline, borderTopColor: palette.rule } : null]}
        >
          <Text variant="label" tone="soft" style={styles.label}>
            {fact.label}
          </Text>
          <View style={styles.value}>
            {typeof fact.value === 'string' ? <Figures>{fact.value}</Figures> : fact.value}
          </View>
        </View>
      ))}
    </View>
  );
}

const styles = StyleSheet.create({
  row: { flexDirection: 'row', flexWrap: 'wrap', columnGap: space.m, paddingVertical: space.s },
  label: { width: 116, flexGrow: 0 },
  value: { flex: 1, minWidth: 140, alignItems: 'flex-start' },
});
