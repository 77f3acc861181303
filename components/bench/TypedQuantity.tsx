import { useId, useState } from 'react';
import { StyleSheet, TextInput, View } from 'react-native';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { web } from '@/components/ui/web-props';
import { fonts, radius, space, touchTarget, typeScale } from '@/constants/theme';
import { formatNumber } from '@/shared/format';
import { toDisplay, type DisplayUnit, type Quantity } from '@/shared/units';
import type { LogRange } from '@/shared/parameters/parameter-specs';
import { parseTyped } from './slider-model';

export interface TypedQuantityProps {
  label: string;
  /** SI. */
  value: number;
  quantity: Quantity;
  unit: DisplayUnit;
  range: LogRange;
  onValue: (value: number) => void;
  locked?: string;
}

/** A value that can be typed over, with any unit of its kind. What cannot be read is said, and the old value stays. */
export function TypedQuantity({ label, value, quantity, unit, range, onValue, locked }: TypedQuantityProps) {
  const { palette } = useTheme();
  const { wide } = useBreakpoint();
  const id = useId();
  const [typed, setTyped] = useState<string | null>(null);
  const [problem, setProblem] = useState<string | null>(null);
  const apply = (keep: boolean) => {
    if (typed === null) return;
    const result = parseTyped(typed, quantity, unit, range);
    if ('value' in result) {
      setProblem(null);
      setTyped(null);
      if (result.value !== value) onValue(result.value);
    } else {
      setProblem(result.message);
      if (!keep) setTyped(null);
    }
  };
  return (
    <View style={styles.place}>
      <View style={styles.row}>
        <TextInput
          aria-label={`${label}, ${unit.symbol}`}
          inputMode="decimal"
          editable={locked === undefined}
          selectTextOnFocus
          value={typed ?? formatNumber(toDisplay(value, unit))}
          onChangeText={(text) => {
            setTyped(text);
            setProblem(null);
          }}
          onSubmitEditing={() => apply(true)}
          onBlur={() => apply(false)}
          {...web({
            'aria-invalid': problem !== null,
            'aria-describedby': problem ? id : undefined,
            onKeyDown: (event) => {
              if (event.key !== 'Escape') return;
              setTyped(null);
              setProblem(null);
            },
          })}
          style={[
            styles.input,
            {
              height: wide ? 30 : touchTarget,
              color: palette.ink,
              borderColor: problem ? palette.vermilion : typed === null ? 'transparent' : palette.rule,
              backgroundColor: typed === null ? 'transparent' : palette.well,
            },
          ]}
        />
        <Text variant="small" tone="soft">
          {unit.symbol}
        </Text>
      </View>
      {problem ? (
        <Text variant="small" tone="vermilion" nativeID={id} role="alert" style={styles.problem}>
          {problem}
        </Text>
      ) : null}
    </View>
  );
}

const styles = StyleSheet.create({
  place: { alignItems: 'flex-end', flexShrink: 0, maxWidth: '62%' },
  row: { flexDirection: 'row', alignItems: 'center', gap: space.xs },
  input: {
    width: 92,
    textAlign: 'right',
    fontFamily: fonts.number,
    fontSize: typeScale.body,
    borderWidth: 1,
    borderRadius: radius,
    paddingHorizontal: space.xs,
  },
  problem: { textAlign: 'right' },
});
