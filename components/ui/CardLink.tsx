import { Link, type Href } from 'expo-router';
import { useState, type ReactNode } from 'react';
import { Pressable, StyleSheet, View } from 'react-native';
import { hairline, radius, space } from '@/constants/theme';
import { useTheme } from './ThemeProvider';
import { web } from './web-props';

export interface CardLinkProps {
  href: Href;
  /** What the screen reader says. */
  label: string;
  /** The one that is open beside the list. */
  current?: boolean;
  children: ReactNode;
}

/** A card of a list that leads to its detail. */
export function CardLink({ href, label, current, children }: CardLinkProps) {
  const { palette } = useTheme();
  const [hovered, setHovered] = useState(false);
  return (
    <Link href={href} asChild>
      <Pressable
        aria-label={label}
        onHoverIn={() => setHovered(true)}
        onHoverOut={() => setHovered(false)}
        {...web({ 'aria-current': current ? 'true' : undefined })}
        style={styles.link}
      >
        <View
          style={[
            styles.card,
            { backgroundColor: palette.sheet, borderColor: palette.rule },
            hovered ? { borderColor: palette.inkSoft } : null,
            current ? { borderColor: palette.petrol, boxShadow: `inset 3px 0 0 ${palette.petrol}` } : null,
          ]}
        >
          {children}
        </View>
      </Pressable>
    </Link>
  );
}

const styles = StyleSheet.create({
  link: { borderRadius: radius },
  card: { borderRadius: radius, borderWidth: hairline, padding: space.m, gap: space.s },
});
