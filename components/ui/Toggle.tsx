import { useId } from 'react';
import { Pressable, StyleSheet, View } from 'react-native';
import { hairline, motionMs, space, touchTarget } from '@/constants/theme';
import { Text } from './Text';
import { useTheme } from './ThemeProvider';
import { web } from './web-props';

export interface ToggleProps {
  label: string;
  value: boolean;
  onChange: (value: boolean) => void;
  /** In a line what it does. */
  hint?: string;
  disabled?: boolean;
}

/** Something that is on or off; the word stands beside the knob, so that neither colour nor side is alone. */
export function Toggle({ label, value, onChange, hint, disabled }: ToggleProps) {
  const { palette } = useTheme();
  const hintId = useId();
  return (
    <Pressable
      role="switch"
      aria-checked={value}
      aria-label={label}
      disabled={disabled}
      onPress={() => onChange(!value)}
      {...web({ 'aria-describedby': hint ? hintId : undefined })}
      style={[styles.row, disabled ? styles.off : null]}
    >
      <View style={styles.words}>
        <Text variant="label" strong>
          {label}
        </Text>
        {hint ? (
          <Text variant="small" tone="soft" nativeID={hintId}>
            {hint}
          </Text>
        ) : null}
      </View>
      <Text variant="label" tone={value ? 'petrol' : 'soft'} strong={value} style={styles.word}>
        {value ? 'on' : 'off'}
      </Text>
      <View
        style={[
          styles.track,
          {
            backgroundColor: value ? palette.petrol : palette.well,
            borderColor: value ? palette.petrol : palette.inkSoft,
          },
        ]}
      >
        <View
          style={[
            styles.knob,
            {
              backgroundColor: value ? palette.onPetrol : palette.inkSoft,
              transform: [{ translateX: value ? TRAVEL_PX : 0 }],
              transitionProperty: 'transform',
              transitionDuration: `${motionMs}ms`,
            },
          ]}
        />
      </View>
    </Pressable>
  );
}

const KNOB_PX = 16;
const TRAVEL_PX = 18;

const styles = StyleSheet.create({
  row: { flexDirection: 'row', alignItems: 'center', gap: space.s, minHeight: touchTarget },
  words: { flex: 1, minWidth: 0 },
  word: { width: 24, textAlign: 'right' },
  off: { opacity: 0.6 },
  track: {
    width: KNOB_PX + TRAVEL_PX + 8,
    height: KNOB_PX + 8,
    borderRadius: (KNOB_PX + 8) / 2,
    borderWidth: hairline,
    padding: 3,
  },
  knob: { width: KNOB_PX, height: KNOB_PX, borderRadius: KNOB_PX / 2 },
});
