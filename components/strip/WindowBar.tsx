import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { fonts, hairline, radius, space } from '@/constants/theme';
import type { Outage } from '@/shared/contracts/runs';
import { formatClock } from '@/shared/format';
import { lengthLabel } from './labels';
import { WITHHELD } from './window-kinds';

export interface WindowBarProps {
  window: Outage;
  /** Middle of the window, px from the strip's left. */
  x: number;
  width: number;
  top: number;
  /** Shows the window large in all charts. */
  onZoom: () => void;
  onEdit: () => void;
  onRemove: () => void;
  onClose: () => void;
}

const BAR_PX = 330;

/** Floats under the selected window: its times in figures, and what can be done with it. */
export function WindowBar({ window, x, width, top, onZoom, onEdit, onRemove, onClose }: WindowBarProps) {
  const { palette } = useTheme();
  const left = Math.max(0, Math.min(width - BAR_PX, x - BAR_PX / 2));
  return (
    <View
      role="toolbar"
      aria-label="Selected outage window"
      style={[styles.bar, { left, top, backgroundColor: palette.sheet, borderColor: palette.vermilion }]}
    >
      <View style={styles.words}>
        <Text variant="small" tone="vermilion" style={styles.number} numberOfLines={1}>
          {`${formatClock(window.startS)}–${formatClock(window.endS)}`}
        </Text>
        <Text variant="small" tone="soft" numberOfLines={1}>
          {`${lengthLabel(window.endS - window.startS)} without ${WITHHELD[window.withhold]}`}
        </Text>
      </View>
      <Button label="Zoom all charts to it" icon="search" iconOnly kind="plain" onPress={onZoom} />
      <Button label="Type times" icon="edit" iconOnly kind="plain" onPress={onEdit} />
      <Button label="Remove the window" icon="delete" iconOnly kind="plain" onPress={onRemove} />
      <Button label="Deselect" icon="close" iconOnly kind="plain" onPress={onClose} />
    </View>
  );
}

const styles = StyleSheet.create({
  bar: {
    position: 'absolute',
    width: BAR_PX,
    flexDirection: 'row',
    alignItems: 'center',
    borderWidth: hairline,
    borderRadius: radius,
    paddingLeft: space.m,
    boxShadow: '0 6px 20px rgba(0, 0, 0, 0.16)',
    zIndex: 10,
  },
  words: { flex: 1, minWidth: 0 },
  number: { fontFamily: fonts.number },
});
