import type { ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { hairline, radius, space } from '@/constants/theme';
import { Icon, type IconName } from './Icon';
import { Text } from './Text';
import { useTheme } from './ThemeProvider';

export interface NoticeProps {
  tone: 'pine' | 'ochre' | 'vermilion' | 'petrol';
  title?: string;
  children?: ReactNode;
  /** Buttons under the words. */
  actions?: ReactNode;
  /** Read out at once. */
  urgent?: boolean;
}

/** A ruled note in the margin: something to know or to mend. */
export function Notice({ tone, title, children, actions, urgent }: NoticeProps) {
  const { palette } = useTheme();
  return (
    <View
      role={urgent ? 'alert' : undefined}
      style={[
        styles.notice,
        { backgroundColor: palette.sheet, borderColor: palette.rule, borderLeftColor: palette[tone] },
      ]}
    >
      <View style={styles.icon}>
        <Icon name={icons[tone]} tone={tone} size={20} />
      </View>
      <View style={styles.words}>
        {title ? (
          <Text variant="body" strong>
            {title}
          </Text>
        ) : null}
        {typeof children === 'string' ? <Text variant="label">{children}</Text> : children}
        {actions ? <View style={styles.actions}>{actions}</View> : null}
      </View>
    </View>
  );
}

const icons: Record<NoticeProps['tone'], IconName> = {
  pine: 'check',
  ochre: 'warn',
  vermilion: 'stop',
  petrol: 'info',
};

const styles = StyleSheet.create({
  notice: {
    flexDirection: 'row',
    gap: space.m,
    padding: space.l,
    paddingLeft: space.m,
    borderRadius: radius,
    borderWidth: hairline,
    borderLeftWidth: 3,
  },
  icon: { paddingTop: 2 },
  words: { flex: 1, gap: space.xs },
  actions: { flexDirection: 'row', flexWrap: 'wrap', gap: space.m, marginTop: space.s },
});
