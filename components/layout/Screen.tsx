import type { Href } from 'expo-router';
import type { ReactNode } from 'react';
import { ScrollView, StyleSheet, View } from 'react-native';
import { space } from '@/constants/theme';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { BackButton } from './BackButton';
import { useBreakpoint } from './use-breakpoint';
import { useDocumentTitle } from './use-document-title';

export interface ScreenProps {
  /** The page's one h1 and the browser's title. */
  title: string;
  /** A line under the title. */
  subtitle?: ReactNode;
  /** Where the back button leads when there is no history; left out: no back button. */
  back?: Href;
  actions?: ReactNode;
  children: ReactNode;
  /** Widest the content grows; `full` takes the screen. */
  width?: 'text' | 'page' | 'full';
  /** False: the children fill the height and scroll by themselves. */
  scroll?: boolean;
}

/** Padding, widths, title and scrolling of every page. */
export function Screen({
  title,
  subtitle,
  back,
  actions,
  children,
  width = 'page',
  scroll = true,
}: ScreenProps) {
  const { palette } = useTheme();
  const { wide } = useBreakpoint();
  useDocumentTitle(title);
  const inner = [
    styles.inner,
    { paddingHorizontal: wide ? space.xl : space.m, paddingTop: wide ? space.l : space.m },
    width === 'full' ? null : { maxWidth: widths[width] },
  ];
  const head = (
    <View style={styles.head}>
      <View style={styles.title}>
        {back ? <BackButton fallback={back} /> : null}
        <View style={styles.words}>
          <Text variant="title" style={wide ? null : styles.phoneTitle}>
            {title}
          </Text>
          {typeof subtitle === 'string' ? (
            <Text variant="label" tone="soft">
              {subtitle}
            </Text>
          ) : (
            subtitle
          )}
        </View>
      </View>
      {actions ? <View style={styles.actions}>{actions}</View> : null}
    </View>
  );
  if (!scroll)
    return (
      <View role="main" style={[styles.fill, { backgroundColor: palette.ground }, inner]}>
        {head}
        {children}
      </View>
    );
  return (
    <ScrollView
      role="main"
      style={[styles.fill, { backgroundColor: palette.ground }]}
      contentContainerStyle={inner}
    >
      {head}
      {children}
    </ScrollView>
  );
}

const widths = { text: 720, page: 1280 } as const;

const styles = StyleSheet.create({
  fill: { flex: 1, minHeight: 0 },
  inner: { width: '100%', gap: space.l, paddingBottom: space.xxl },
  head: {
    flexDirection: 'row',
    flexWrap: 'wrap',
    alignItems: 'center',
    justifyContent: 'space-between',
    gap: space.m,
    minHeight: 48,
  },
  title: { flexDirection: 'row', alignItems: 'center', gap: space.xs, flex: 1, flexBasis: 180, minWidth: 0 },
  words: { flexShrink: 1 },
  phoneTitle: { fontSize: 24, lineHeight: 30 },
  actions: { flexDirection: 'row', flexWrap: 'wrap', gap: space.s, maxWidth: '100%' },
});
