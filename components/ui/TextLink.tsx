import { Link, type Href } from 'expo-router';
import { StyleSheet } from 'react-native';
import { fonts, touchTarget, typeScale } from '@/constants/theme';
import { useTheme } from './ThemeProvider';

export interface TextLinkProps {
  href: Href;
  label: string;
  /** Where the same words lead to several places: "Open Breakwater loop 3". */
  spoken?: string;
}

/** A link in words, tall enough for a thumb. */
export function TextLink({ href, label, spoken }: TextLinkProps) {
  const { palette } = useTheme();
  return (
    <Link href={href} aria-label={spoken} style={[styles.link, { color: palette.petrol }]}>
      {label}
    </Link>
  );
}

const styles = StyleSheet.create({
  link: {
    fontFamily: fonts.labelStrong,
    fontSize: typeScale.body,
    lineHeight: 20,
    paddingVertical: (touchTarget - 20) / 2,
  },
});
