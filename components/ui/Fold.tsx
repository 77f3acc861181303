import { useState } from 'react';
import { Pressable, StyleSheet, View } from 'react-native';
import { Icon } from './Icon';
import { Text } from './Text';
import { space, touchTarget } from '@/constants/theme';

export interface FoldProps {
  /** What lies inside, so that nobody opens it in vain. */
  title: string;
  /** Open at first: there is something in it that differs from what is usual. */
  open?: boolean;
  /** Cannot be closed: something in it is still wrong. */
  fault?: boolean;
  children: React.ReactNode;
}

/** What few people need, a press away. */
export function Fold({ title, open: first = false, fault = false, children }: FoldProps) {
  const [chosen, setChosen] = useState(first);
  const open = chosen || fault;
  return (
    <View style={styles.fold}>
      <Pressable
        role="button"
        aria-expanded={open}
        onPress={() => setChosen(!open)}
        style={({ pressed }) => [styles.head, pressed ? styles.pressed : null]}
      >
        <Icon name={open ? 'up' : 'down'} size={20} tone="petrol" />
        <Text variant="label" tone="petrol" strong style={styles.title}>
          {title}
        </Text>
      </Pressable>
      {open ? <View style={styles.body}>{children}</View> : null}
    </View>
  );
}

const styles = StyleSheet.create({
  fold: { gap: space.s },
  head: { flexDirection: 'row', alignItems: 'center', gap: space.s, minHeight: touchTarget },
  pressed: { opacity: 0.8 },
  title: { flexShrink: 1 },
  body: { gap: space.m },
});
