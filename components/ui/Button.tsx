import { useState } from 'react';
import { ActivityIndicator, Pressable, StyleSheet, View, type PressableProps } from 'react-native';
import { hairline, radius, space, touchTarget } from '@/constants/theme';
import { Icon, type IconName } from './Icon';
import { Text, toneColour, type Tone } from './Text';
import { useTheme } from './ThemeProvider';

export type ButtonKind = 'primary' | 'quiet' | 'danger' | 'plain';

export interface ButtonProps extends Omit<PressableProps, 'children' | 'style' | 'disabled'> {
  label: string;
  kind?: ButtonKind;
  icon?: IconName;
  /** Shows the icon alone; the label is then read to the screen reader only. */
  iconOnly?: boolean;
  busy?: boolean;
  disabled?: boolean;
  /** Why it is disabled: shown on hover and read by the screen reader. */
  reason?: string;
  /** Takes the whole width of its parent. */
  wide?: boolean;
}

/** 44 high at the least. While busy it keeps its width and takes no press. */
export function Button({
  label,
  kind = 'quiet',
  icon,
  iconOnly,
  busy,
  disabled,
  reason,
  wide,
  ...rest
}: ButtonProps) {
  const { palette } = useTheme();
  const [hovered, setHovered] = useState(false);
  const off = disabled || busy;
  const tone = textTone[kind];
  const filled = kind === 'primary';
  const spoken = reason && disabled ? `${label}. ${reason}` : label;
  return (
    <Pressable
      role="button"
      aria-label={iconOnly || (reason && disabled) ? spoken : undefined}
      aria-busy={busy}
      disabled={off}
      onHoverIn={() => setHovered(true)}
      onHoverOut={() => setHovered(false)}
      {...(reason && disabled ? { title: reason } : null)}
      {...rest}
      style={({ pressed }) => [
        styles.base,
        iconOnly ? styles.iconOnly : null,
        wide ? styles.wide : null,
        {
          backgroundColor: filled ? palette.petrol : kind === 'plain' ? 'transparent' : palette.sheet,
          borderColor: kind === 'plain' ? 'transparent' : filled ? palette.petrol : palette.rule,
        },
        hovered && !off && !filled ? { backgroundColor: palette.well } : null,
        pressed || (hovered && filled && !off) ? styles.pressed : null,
        disabled ? styles.disabled : null,
      ]}
    >
      {icon ? <Icon name={icon} size={20} tone={tone} /> : null}
      {iconOnly ? null : (
        <Text variant="label" strong tone={tone} style={styles.text}>
          {label}
        </Text>
      )}
      {busy ? (
        <View style={[styles.busy, { backgroundColor: filled ? palette.petrol : palette.sheet }]}>
          <ActivityIndicator size="small" color={toneColour(palette, tone)} />
        </View>
      ) : null}
    </Pressable>
  );
}

const textTone: Record<ButtonKind, Tone> = {
  primary: 'onPetrol',
  quiet: 'petrol',
  danger: 'vermilion',
  plain: 'petrol',
};

const styles = StyleSheet.create({
  base: {
    minHeight: touchTarget,
    minWidth: touchTarget,
    paddingHorizontal: space.l,
    paddingVertical: space.s,
    borderRadius: radius,
    borderWidth: hairline,
    flexDirection: 'row',
    alignItems: 'center',
    justifyContent: 'center',
    gap: space.s,
  },
  iconOnly: { paddingHorizontal: space.s },
  wide: { alignSelf: 'stretch' },
  text: { fontSize: 15, textAlign: 'center', flexShrink: 1 },
  pressed: { opacity: 0.88 },
  disabled: { opacity: 0.55 },
  busy: {
    ...StyleSheet.absoluteFill,
    alignItems: 'center',
    justifyContent: 'center',
    borderRadius: radius,
  },
});
