import type { ReactNode } from 'react';
import { ScrollView, StyleSheet, View } from 'react-native';
import { hairline, space } from '@/constants/theme';
import { ModalFrame } from './ModalFrame';
import { useTheme } from './ThemeProvider';

export interface SheetProps {
  open: boolean;
  title: string;
  onClose: () => void;
  children: ReactNode;
  footer?: ReactNode;
}

/** A modal sheet that rises from the lower edge: choices and short forms on the phone. */
export function Sheet({ open, title, onClose, children, footer }: SheetProps) {
  if (!open) return null;
  return (
    <ModalFrame
      title={title}
      onClose={onClose}
      footer={footer}
      placement={{
        width: 'min(640px, 100vw)',
        maxWidth: '100vw',
        maxHeight: '88dvh',
        margin: 'auto auto 0',
        borderRadius: `${CORNER}px ${CORNER}px 0 0`,
        display: 'flex',
      }}
    >
      {children}
    </ModalFrame>
  );
}

export interface InlineSheetProps {
  /** What the screen reader calls it. */
  label: string;
  /** Fixed above the scrolling part: tabs, a handle. */
  head?: ReactNode;
  height: number | `${number}%`;
  children: ReactNode;
}

/** A sheet that leaves the page above it usable: the bench's parameters on the phone. */
export function InlineSheet({ label, head, height, children }: InlineSheetProps) {
  const { palette } = useTheme();
  return (
    <View
      role="region"
      aria-label={label}
      style={[styles.inline, { height, backgroundColor: palette.sheet, borderColor: palette.rule }]}
    >
      <View style={[styles.grip, { backgroundColor: palette.rule }]} />
      {head}
      <ScrollView style={styles.scroll} contentContainerStyle={styles.body}>
        {children}
      </ScrollView>
    </View>
  );
}

const CORNER = 14;

const styles = StyleSheet.create({
  inline: {
    borderTopLeftRadius: CORNER,
    borderTopRightRadius: CORNER,
    borderWidth: hairline,
    borderBottomWidth: 0,
    boxShadow: '0 -6px 24px rgba(0, 0, 0, 0.12)',
  },
  grip: { width: 36, height: 4, borderRadius: 2, alignSelf: 'center', marginTop: space.s },
  scroll: { flex: 1 },
  body: { paddingHorizontal: space.m, paddingBottom: space.l },
});
