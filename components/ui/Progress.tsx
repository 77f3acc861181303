import { StyleSheet, View } from 'react-native';
import { space } from '@/constants/theme';
import { Text } from './Text';
import { useTheme } from './ThemeProvider';

export interface ProgressProps {
  label: string;
  /** 0…1; left out: under way, how far is not known. */
  value?: number;
  /** To the right: what is left, bytes done. */
  detail?: string;
  labelHidden?: boolean;
}

/** A bar for long work. */
export function Progress({ label, value, detail, labelHidden }: ProgressProps) {
  const { palette } = useTheme();
  const percent = value === undefined ? undefined : Math.round(Math.min(1, Math.max(0, value)) * 100);
  return (
    <View style={{ gap: space.xs }}>
      {labelHidden ? null : (
        <View style={styles.words}>
          <Text variant="label" strong>
            {label}
          </Text>
          <Text variant="label" tone="soft">
            {detail ?? (percent === undefined ? '' : `${percent} %`)}
          </Text>
        </View>
      )}
      <View
        role="progressbar"
        aria-label={label}
        aria-valuemin={0}
        aria-valuemax={100}
        aria-valuenow={percent}
        aria-valuetext={detail}
        style={[styles.track, { backgroundColor: palette.rule }]}
      >
        <View
          style={{
            width: percent === undefined ? '100%' : `${percent}%`,
            height: '100%',
            borderRadius: 2,
            backgroundColor: palette.petrol,
            opacity: percent === undefined ? 0.45 : 1,
          }}
        />
      </View>
    </View>
  );
}

const styles = StyleSheet.create({
  words: { flexDirection: 'row', flexWrap: 'wrap', justifyContent: 'space-between', gap: space.s },
  track: { height: 4, borderRadius: 2, overflow: 'hidden' },
});
