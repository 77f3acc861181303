import { useState } from 'react';
import { Pressable, ScrollView, StyleSheet, View } from 'react-native';
import { Icon } from '@/components/ui/Icon';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, space, touchTarget } from '@/constants/theme';
import { ParameterPanel } from './ParameterPanel';
import type { ParameterGroup } from './parameter-specs';
import type { Bench } from './use-bench';
import { ViewTabs } from './ViewTabs';

const GROUPS: readonly { id: ParameterGroup; label: string }[] = [
  { id: 'gnss', label: 'GNSS' },
  { id: 'gyro', label: 'Gyro' },
  { id: 'accel', label: 'Accelerometer' },
  { id: 'gate', label: 'Gate' },
];

export interface ParameterSheetProps {
  bench: Bench;
  open: boolean;
  onOpen: (open: boolean) => void;
  /** When open, px: about half of the screen, so that the chart stays in sight. */
  height: number;
}

/** The parameters on the phone: a bar that opens to half the screen and leaves the chart usable. */
export function ParameterSheet({ bench, open, onOpen, height }: ParameterSheetProps) {
  const { palette } = useTheme();
  const [group, setGroup] = useState<ParameterGroup>('gnss');
  return (
    <View
      role="region"
      aria-label="Parameters"
      style={[
        styles.sheet,
        { backgroundColor: palette.sheet, borderColor: palette.rule, height: open ? height : BAR_PX },
      ]}
    >
      <Pressable
        role="button"
        aria-expanded={open}
        aria-label={open ? 'Close the parameters' : 'Open the parameters'}
        onPress={() => onOpen(!open)}
        style={styles.bar}
      >
        <View style={[styles.grip, { backgroundColor: palette.ghost }]} />
        <View style={styles.barRow}>
          <Text variant="label" strong>
            Parameters
          </Text>
          <Icon name={open ? 'down' : 'up'} size={20} tone="soft" />
        </View>
      </Pressable>
      {open ? (
        <>
          <View style={[styles.tabs, { borderBottomColor: palette.rule }]}>
            <ViewTabs views={GROUPS} value={group} onChange={setGroup} label="Parameter groups" />
          </View>
          <ScrollView style={styles.fill} contentContainerStyle={styles.body}>
            <ParameterPanel bench={bench} group={group} />
          </ScrollView>
        </>
      ) : null}
    </View>
  );
}

const BAR_PX = touchTarget + 8;
const CORNER = 14;

const styles = StyleSheet.create({
  sheet: {
    borderTopLeftRadius: CORNER,
    borderTopRightRadius: CORNER,
    borderWidth: hairline,
    borderBottomWidth: 0,
    boxShadow: '0 -6px 24px rgba(0, 0, 0, 0.12)',
    zIndex: 6,
  },
  bar: { minHeight: BAR_PX - 1, paddingHorizontal: space.l, justifyContent: 'center' },
  barRow: { flexDirection: 'row', justifyContent: 'space-between', alignItems: 'center' },
  grip: { width: 36, height: 4, borderRadius: 2, alignSelf: 'center', marginBottom: space.xs },
  tabs: { borderBottomWidth: hairline, flexDirection: 'row' },
  fill: { flex: 1 },
  body: { paddingHorizontal: space.l, paddingBottom: space.l },
});
