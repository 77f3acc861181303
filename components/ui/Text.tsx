import { Text as NativeText, type TextProps as NativeTextProps, type TextStyle } from 'react-native';
import { fonts, typeScale, type Palette } from '@/constants/theme';
import { useTheme } from './ThemeProvider';
import { web } from './web-props';

export type TextVariant = 'title' | 'heading' | 'body' | 'label' | 'small';
export type Tone = 'ink' | 'soft' | 'petrol' | 'onPetrol' | 'vermilion' | 'pine' | 'ochre';

export interface TextProps extends Omit<NativeTextProps, 'role'> {
  variant?: TextVariant;
  tone?: Tone;
  strong?: boolean;
  /** Makes it a heading of this level for the screen reader; title is 1 and heading 2 by themselves. 0: not a heading. */
  level?: 0 | 1 | 2 | 3;
  align?: TextStyle['textAlign'];
  role?: NativeTextProps['role'];
}

/** All words on screen: Barlow for text, Barlow Semi Condensed for labels. */
export function Text({ variant = 'body', tone = 'ink', strong, level, align, style, ...rest }: TextProps) {
  const { palette } = useTheme();
  const heading = level ?? (variant === 'title' ? 1 : variant === 'heading' ? 2 : 0);
  return (
    <NativeText
      {...(heading > 0 ? { role: 'heading', ...web({ 'aria-level': heading }) } : null)}
      {...rest}
      style={[
        variants[variant],
        strong ? { fontFamily: isLabel(variant) ? fonts.labelStrong : fonts.textStrong } : null,
        { color: toneColour(palette, tone), textAlign: align },
        style,
      ]}
    />
  );
}

/** The palette's colour of a tone. */
export function toneColour(palette: Palette, tone: Tone): string {
  return tone === 'soft' ? palette.inkSoft : palette[tone];
}

const isLabel = (variant: TextVariant) => variant === 'label' || variant === 'small';

const variants: Record<TextVariant, TextStyle> = {
  title: { fontFamily: fonts.textStrong, fontSize: typeScale.title, lineHeight: 34 },
  heading: { fontFamily: fonts.textStrong, fontSize: typeScale.heading, lineHeight: 26 },
  body: { fontFamily: fonts.text, fontSize: typeScale.body, lineHeight: 24 },
  label: { fontFamily: fonts.label, fontSize: typeScale.label, lineHeight: 20 },
  small: { fontFamily: fonts.label, fontSize: typeScale.small, lineHeight: 16 },
};
