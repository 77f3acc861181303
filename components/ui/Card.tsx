import { StyleSheet, View, type ViewProps } from 'react-native';
import { hairline, radius, space } from '@/constants/theme';
import { Text } from './Text';
import { useTheme } from './ThemeProvider';

export interface CardProps extends ViewProps {
  title?: string;
  /** To the right of the title. */
  action?: React.ReactNode;
  /** No inner padding: for lists and charts that run to the edge. */
  bare?: boolean;
}

/** A sheet with a hairline; several stacked cards make a page. */
export function Card({ title, action, bare, style, children, ...rest }: CardProps) {
  const { palette } = useTheme();
  return (
    <View
      {...rest}
      style={[
        styles.card,
        { backgroundColor: palette.sheet, borderColor: palette.rule },
        bare ? null : styles.padded,
        style,
      ]}
    >
      {title ? (
        <View style={[styles.head, bare ? styles.bareHead : null]}>
          <Text variant="label" strong level={2} style={styles.title}>
            {title}
          </Text>
          {action}
        </View>
      ) : null}
      {children}
    </View>
  );
}

const styles = StyleSheet.create({
  card: { borderRadius: radius, borderWidth: hairline },
  padded: { padding: space.l, gap: space.m },
  head: {
    flexDirection: 'row',
    alignItems: 'center',
    justifyContent: 'space-between',
    gap: space.m,
    flexWrap: 'wrap',
  },
  bareHead: { padding: space.l, paddingBottom: space.s },
  title: { fontSize: 16, flexShrink: 1 },
});
