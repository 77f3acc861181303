import { Stack } from 'expo-router';
import type { ReactNode } from 'react';
import { ScrollView, StyleSheet, View } from 'react-native';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, space } from '@/constants/theme';
import { useBreakpoint } from './use-breakpoint';

export interface MasterDetailProps {
  /** Names the list. */
  title: string;
  /** Beside the list's name. */
  action?: ReactNode;
  list: ReactNode;
  /** False: pages take the whole width (a form that has nothing to do with the list). */
  showList?: boolean;
}

/** A layout of nested pages: on wide screens the list stays beside them, on the phone they follow each other. */
export function MasterDetail({ title, action, list, showList = true }: MasterDetailProps) {
  const { palette } = useTheme();
  const { wide, extraWide } = useBreakpoint();
  return (
    <View style={styles.row}>
      {wide && showList ? (
        <ScrollView
          role="region"
          aria-label={title}
          style={[styles.list, { width: extraWide ? 400 : 330, borderRightColor: palette.rule }]}
          contentContainerStyle={styles.inner}
        >
          <View style={styles.head}>
            <Text variant="heading">{title}</Text>
            {action}
          </View>
          {list}
        </ScrollView>
      ) : null}
      <View style={styles.detail}>
        <Stack
          screenOptions={{
            headerShown: false,
            animation: 'none',
            contentStyle: { backgroundColor: 'transparent' },
          }}
        />
      </View>
    </View>
  );
}

const styles = StyleSheet.create({
  row: { flex: 1, flexDirection: 'row', minHeight: 0 },
  list: { flexGrow: 0, flexShrink: 0, borderRightWidth: hairline },
  inner: { padding: space.l, gap: space.l },
  head: {
    flexDirection: 'row',
    alignItems: 'center',
    justifyContent: 'space-between',
    minHeight: 48,
    gap: space.m,
  },
  detail: { flex: 1, minWidth: 0, minHeight: 0 },
});
