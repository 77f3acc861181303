import { createContext, useCallback, useContext, useEffect, useMemo, useState, type ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { hairline, radius, space } from '@/constants/theme';
import { Button } from './Button';
import { Icon } from './Icon';
import { Text } from './Text';
import { useTheme } from './ThemeProvider';
import { web } from './web-props';

export interface ToastMessage {
  message: string;
  tone?: 'pine' | 'vermilion' | 'ochre';
  /** Offers to take the deed back. */
  undo?: () => void;
}

type Show = (toast: ToastMessage) => void;
const ToastContext = createContext<Show | null>(null);
const SHOWN_MS = 10_000;

/** Short news at the lower edge, read out politely; stays while the pointer or the focus is on it. */
export function ToastProvider({ children }: { children: ReactNode }) {
  const [toast, setToast] = useState<(ToastMessage & { key: number }) | null>(null);
  const show = useCallback<Show>((next) => setToast({ ...next, key: Date.now() }), []);
  const close = useCallback(() => setToast(null), []);
  return (
    <ToastContext.Provider value={show}>
      {children}
      <View style={styles.place} pointerEvents="box-none" role="status" aria-live="polite">
        {toast ? <Toast key={toast.key} toast={toast} onClose={close} /> : null}
      </View>
    </ToastContext.Provider>
  );
}

/** `const toast = useToast(); toast({ message: 'Renamed.', undo })` */
export function useToast(): Show {
  const show = useContext(ToastContext);
  if (!show) throw new Error('useToast needs a ToastProvider above it.');
  return show;
}

function Toast({ toast, onClose }: { toast: ToastMessage; onClose: () => void }) {
  const { palette } = useTheme();
  const [held, setHeld] = useState(false);
  const tone = toast.tone ?? 'pine';
  const hold = useMemo(() => ({ onMouseEnter: () => setHeld(true), onMouseLeave: () => setHeld(false) }), []);
  useEffect(() => {
    if (held) return;
    const timer = setTimeout(onClose, SHOWN_MS);
    return () => clearTimeout(timer);
  }, [held, onClose]);
  return (
    <View
      {...web(hold)}
      style={[
        styles.toast,
        { backgroundColor: palette.sheet, borderColor: palette.rule, borderLeftColor: palette[tone] },
      ]}
    >
      <Icon name={tone === 'pine' ? 'check' : 'warn'} tone={tone} size={20} />
      <Text variant="label" style={styles.message}>
        {toast.message}
      </Text>
      {toast.undo ? (
        <Button
          label="Undo"
          kind="plain"
          onFocus={() => setHeld(true)}
          onBlur={() => setHeld(false)}
          onPress={() => {
            toast.undo?.();
            onClose();
          }}
        />
      ) : null}
      <Button label="Dismiss" icon="close" iconOnly kind="plain" onPress={onClose} />
    </View>
  );
}

const styles = StyleSheet.create({
  place: {
    position: 'absolute',
    left: space.m,
    right: space.m,
    bottom: 84,
    alignItems: 'center',
    zIndex: 20,
  },
  toast: {
    flexDirection: 'row',
    alignItems: 'center',
    gap: space.s,
    paddingLeft: space.m,
    borderRadius: radius,
    borderWidth: hairline,
    borderLeftWidth: 3,
    maxWidth: 560,
    boxShadow: '0 6px 24px rgba(0, 0, 0, 0.16)',
  },
  message: { flexShrink: 1, paddingVertical: space.m },
});
