import { useState } from 'react';
import { Pressable, ScrollView, StyleSheet, View } from 'react-native';
import { Icon } from '@/components/ui/Icon';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, space, touchTarget } from '@/constants/theme';
import { HistoryActions } from './BenchActions';
import { ParameterPanel } from './ParameterPanel';
import type { ParameterGroup } from '@/shared/parameters/parameter-specs';
import type { Bench } from './use-bench';
import { ViewTabs } from './ViewTabs';

const GROUPS: readonly { id: ParameterGroup; label: string }[] = [
  { id: 'gnss', label: 'GNSS' },
  { id: 'gyro', label: 'Gyro' },
  { id: 'accel', label: 'Accelerometer' },
  { id: 'gate', label: 'Gate' },
  { id: 'aids', label: 'Aids' },
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
      <View style={[styles.grip, { backgroundColor: palette.ghost }]} />
      <View style={styles.bar}>
        <Pressable
          role="button"
          aria-expanded={open}
          aria-label={open ? 'Close the parameters' : 'Open the parameters'}
          onPress={() => onOpen(!open)}
          style={styles.toggle}
        >
          <Icon name={open ? 'down' : 'up'} size={20} tone="petrol" />
          <Text variant="body" strong tone="petrol">
            Parameters
          </Text>
        </Pressable>
        <HistoryActions bench={bench} compact />
      </View>
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

const BAR_PX = touchTarget + 16;
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
  grip: { width: 36, height: 4, borderRadius: 2, alignSelf: 'center', marginTop: 6 },
  bar: { height: touchTarget, flexDirection: 'row', alignItems: 'center', paddingRight: space.s },
  toggle: {
    flex: 1,
    height: touchTarget,
    flexDirection: 'row',
    alignItems: 'center',
    gap: space.s,
    paddingHorizontal: space.l,
  },
  tabs: { borderBottomWidth: hairline, flexDirection: 'row' },
  fill: { flex: 1 },
  body: { paddingHorizontal: space.l, paddingBottom: space.l },
});
