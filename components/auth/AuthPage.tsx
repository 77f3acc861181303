import type { ReactNode } from 'react';
import { ScrollView, StyleSheet, View } from 'react-native';
import { Mark } from '@/components/layout/Mark';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { useDocumentTitle } from '@/components/layout/use-document-title';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, space } from '@/constants/theme';
import { Thread } from './Thread';

export interface AuthPageProps {
  title: string;
  lead?: string;
  children: ReactNode;
}

/** The signed-out pages: the product's name and what it is for beside one short form. */
export function AuthPage({ title, lead, children }: AuthPageProps) {
  const { palette } = useTheme();
  const { wide } = useBreakpoint();
  useDocumentTitle(title);
  return (
    <ScrollView
      role="main"
      style={[styles.page, { backgroundColor: palette.ground }]}
      contentContainerStyle={[styles.inner, wide ? styles.row : null]}
    >
      <View
        style={[
          styles.side,
          wide ? styles.sideWide : styles.sideNarrow,
          wide ? { borderRightColor: palette.rule } : null,
        ]}
      >
        <View style={styles.brand}>
          <Mark size={wide ? 44 : 34} />
          <Text variant={wide ? 'title' : 'heading'} level={0}>
            Driftwright
          </Text>
        </View>
        {wide ? (
          <>
            <Text style={styles.claim} tone="soft">
              Tune the filter that blends an IMU with GNSS, cut GNSS on purpose, and see how far the solution
              drifts before the vehicle has to find out.
            </Text>
            <Thread />
          </>
        ) : null}
      </View>
      <View style={[styles.formSide, wide ? styles.formWide : null]}>
        <View style={styles.form}>
          <View style={{ gap: space.xs }}>
            <Text variant="title">{title}</Text>
            {lead ? <Text tone="soft">{lead}</Text> : null}
          </View>
          {children}
        </View>
      </View>
    </ScrollView>
  );
}

const styles = StyleSheet.create({
  page: { flex: 1 },
  inner: { flexGrow: 1 },
  row: { flexDirection: 'row' },
  side: { padding: space.l },
  sideNarrow: { paddingTop: space.xl },
  sideWide: {
    flex: 1,
    padding: 56,
    justifyContent: 'space-between',
    borderRightWidth: hairline,
    gap: space.xxl,
  },
  brand: { flexDirection: 'row', alignItems: 'center', gap: space.m },
  claim: { maxWidth: 440, fontSize: 20, lineHeight: 30 },
  formSide: { paddingHorizontal: space.l, paddingBottom: space.xxl },
  formWide: { flex: 1, paddingHorizontal: 56, paddingVertical: 40, justifyContent: 'center' },
  form: { width: '100%', maxWidth: 440, gap: space.xl, alignSelf: 'center' },
});
