import type { ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';

/** For the screen reader alone. */
export function VisuallyHidden({ children }: { children: ReactNode }) {
  return <View style={styles.hidden}>{children}</View>;
}

const styles = StyleSheet.create({
  hidden: { position: 'absolute', width: 1, height: 1, overflow: 'hidden', opacity: 0 },
});
