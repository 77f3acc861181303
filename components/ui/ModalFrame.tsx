import { useId, useLayoutEffect, useRef, type CSSProperties, type ReactNode } from 'react';
import { ScrollView, StyleSheet, View } from 'react-native';
import { hairline, space } from '@/constants/theme';
import { Button } from './Button';
import { Text } from './Text';
import { useTheme } from './ThemeProvider';

export interface ModalFrameProps {
  title: string;
  onClose: () => void;
  children: ReactNode;
  /** Stays below the scrolling part. */
  footer?: ReactNode;
  /** Placement and size of the native dialog element. */
  placement: CSSProperties;
}

/** A native <dialog>: the browser keeps the focus inside, Escape closes, and the focus returns to where it was. */
export function ModalFrame({ title, onClose, children, footer, placement }: ModalFrameProps) {
  const { palette } = useTheme();
  const dialog = useRef<HTMLDialogElement>(null);
  const titleId = useId();
  // Before the element leaves the page: only then does closing give the focus back.
  useLayoutEffect(() => {
    const element = dialog.current;
    if (element && !element.open) openOn(element);
    return () => element?.close?.();
  }, []);
  return (
    <dialog
      ref={dialog}
      tabIndex={-1}
      aria-labelledby={titleId}
      onCancel={(event) => {
        event.preventDefault();
        onClose();
      }}
      onClick={(event) => {
        if (event.target === dialog.current) onClose();
      }}
      style={{
        padding: 0,
        color: palette.ink,
        background: palette.sheet,
        border: `${hairline}px solid ${palette.rule}`,
        boxShadow: '0 8px 32px rgba(0, 0, 0, 0.18)',
        overflow: 'hidden',
        outline: 'none',
        boxSizing: 'border-box',
        ...placement,
      }}
    >
      <View style={styles.frame}>
        <View style={styles.head}>
          <Text variant="heading" nativeID={titleId} style={styles.title}>
            {title}
          </Text>
          <Button label="Close" icon="close" iconOnly kind="plain" onPress={onClose} />
        </View>
        <ScrollView contentContainerStyle={styles.body} style={styles.scroll}>
          {children}
        </ScrollView>
        {footer ? <View style={[styles.footer, { borderTopColor: palette.rule }]}>{footer}</View> : null}
      </View>
    </dialog>
  );
}

/** Opens with the first field in focus; on a touch screen without it, lest the keyboard cover the dialog. */
function openOn(element: HTMLDialogElement) {
  element.showModal?.();
  const touch = typeof matchMedia === 'undefined' || matchMedia('(pointer: coarse)').matches;
  const field = touch ? null : element.querySelector<HTMLElement>('input, textarea, select');
  (field ?? element).focus?.();
}

const styles = StyleSheet.create({
  frame: { width: '100%', maxHeight: '100%', flexShrink: 1 },
  head: {
    flexDirection: 'row',
    alignItems: 'flex-start',
    justifyContent: 'space-between',
    gap: space.m,
    paddingLeft: space.xl,
    paddingRight: space.s,
    paddingTop: space.s,
  },
  title: { flexShrink: 1, paddingTop: 9 },
  scroll: { flexGrow: 0, flexShrink: 1 },
  body: { paddingHorizontal: space.xl, paddingTop: space.s, paddingBottom: space.xl, gap: space.l },
  footer: {
    flexDirection: 'row',
    flexWrap: 'wrap',
    justifyContent: 'flex-end',
    gap: space.m,
    paddingHorizontal: space.xl,
    paddingVertical: space.m,
    borderTopWidth: hairline,
  },
});
