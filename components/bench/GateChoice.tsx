import { StyleSheet, View } from 'react-native';
import { Choice } from '@/components/ui/Choice';
import { Text } from '@/components/ui/Text';
import { space } from '@/constants/theme';
import type { Bench } from './use-bench';

const PROBABILITIES = [
  { value: 'off', label: 'Off' },
  { value: '0.95', label: '95 %' },
  { value: '0.99', label: '99 %' },
  { value: '0.999', label: '99.9 %' },
  { value: '0.9999', label: '99.99 %' },
] as const;

/** χ² probability that a good fix passes; off takes every fix. */
export function GateChoice({ bench }: { bench: Bench }) {
  const { enabled, probability } = bench.config.parameters.gate;
  const value = enabled ? String(probability) : 'off';
  const known = PROBABILITIES.some((option) => option.value === value);
  const options = known ? PROBABILITIES : [...PROBABILITIES, { value, label: `${probability * 100} %` }];
  const choose = (next: string) =>
    bench.setParameters([
      { path: 'gate.enabled', value: next !== 'off' },
      ...(next === 'off' ? [] : [{ path: 'gate.probability', value: Number(next) }]),
    ]);
  return (
    <View style={styles.gate}>
      <Choice
        label="Gate: a good fix passes with"
        shape="select"
        value={value}
        options={options}
        onChange={choose}
        disabled={bench.locked !== null}
      />
      <Text variant="small" tone="soft">
        lower: shuts out more outliers, and more good fixes
      </Text>
    </View>
  );
}

const styles = StyleSheet.create({ gate: { gap: space.xs, paddingVertical: space.s } });
