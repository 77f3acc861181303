import type { ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { hairline, radius, space } from '@/constants/theme';
import { Icon, type IconName } from './Icon';
import { Text } from './Text';
import { useTheme } from './ThemeProvider';

export interface EmptyStateProps {
  icon: IconName;
  title: string;
  /** What to do first. */
  message: string;
  actions?: ReactNode;
}

/** Where a list would be while there is nothing to list. */
export function EmptyState({ icon, title, message, actions }: EmptyStateProps) {
  const { palette } = useTheme();
  return (
    <View style={[styles.box, { borderColor: palette.rule }]}>
      <Icon name={icon} size={32} tone="soft" />
      <Text variant="heading" align="center">
        {title}
      </Text>
      <Text tone="soft" align="center" style={styles.message}>
        {message}
      </Text>
      {actions ? <View style={styles.actions}>{actions}</View> : null}
    </View>
  );
}

const styles = StyleSheet.create({
  box: {
    alignItems: 'center',
    gap: space.m,
    paddingHorizontal: space.xl,
    paddingVertical: 40,
    borderWidth: hairline,
    borderStyle: 'dashed',
    borderRadius: radius,
  },
  message: { maxWidth: 460 },
  actions: {
    flexDirection: 'row',
    flexWrap: 'wrap',
    justifyContent: 'center',
    gap: space.m,
    marginTop: space.s,
  },
});
