import { StyleSheet, View } from 'react-native';
import { Choice } from '@/components/ui/Choice';
import { Text } from '@/components/ui/Text';
import { space } from '@/constants/theme';
import type { AxisMap } from '@/shared/contracts/vehicles';
import { AxisDrawing } from './AxisDrawing';
import { axesFrom, axesSentence, axisName, downOptions, SIGNED_AXES } from './axes';

export interface AxisPickerProps {
  value: AxisMap;
  onChange: (axes: AxisMap) => void;
  error?: string;
  disabled?: boolean;
}

/** Forward and down are chosen, right follows: a mirrored frame cannot come about. */
export function AxisPicker({ value, onChange, error, disabled }: AxisPickerProps) {
  return (
    <View style={styles.row}>
      <View style={styles.fields}>
        <Choice
          label="Points forward"
          options={SIGNED_AXES.map((axis) => ({ value: axis, label: `${axisName(axis)} of the sensor` }))}
          value={value.forward}
          onChange={(forward) => onChange(axesFrom(forward, value.down))}
          disabled={disabled}
        />
        <Choice
          label="Points down"
          options={downOptions(value.forward).map((axis) => ({
            value: axis,
            label: `${axisName(axis)} of the sensor`,
          }))}
          value={value.down}
          onChange={(down) => onChange(axesFrom(value.forward, down))}
          error={error}
          disabled={disabled}
        />
        <Text variant="label" tone="soft" aria-live="polite">
          {`Then ${axisName(value.right)} points right. The sensor has ${axesSentence(value)}.`}
        </Text>
      </View>
      <AxisDrawing axes={value} />
    </View>
  );
}

const styles = StyleSheet.create({
  row: { flexDirection: 'row', flexWrap: 'wrap', gap: space.l, alignItems: 'center' },
  fields: { flexGrow: 1, flexShrink: 1, flexBasis: 220, gap: space.m, minWidth: 0 },
});
