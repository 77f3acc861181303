import { useState, type ReactNode } from 'react';
import { ActivityIndicator, Pressable, StyleSheet, View, type PressableProps } from 'react-native';
import { hairline, radius, space, touchTarget } from '@/constants/theme';
import { Icon, type IconName } from './Icon';
import { Text, toneColour, type Tone } from './Text';
import { useTheme } from './ThemeProvider';
import { web } from './web-props';

export type ButtonKind = 'primary' | 'quiet' | 'danger' | 'plain';

export interface ButtonProps extends Omit<PressableProps, 'children' | 'style' | 'disabled'> {
  label: string;
  kind?: ButtonKind;
  icon?: IconName;
  /** Shows the icon alone; the label is then read out, and shown under the pointer or the focus. */
  iconOnly?: boolean;
  busy?: boolean;
  disabled?: boolean;
  /** Why it is disabled: read out, and shown under the pointer or at a touch. */
  reason?: string;
  /** Takes the whole width of its parent. */
  wide?: boolean;
}

/** 44 high at the least. While busy it keeps its width and takes no press. */
export function Button(props: ButtonProps) {
  return props.disabled && props.reason ? (
    <Explained reason={props.reason} wide={props.wide}>
      <Plain {...props} />
    </Explained>
  ) : (
    <Plain {...props} />
  );
}

function Plain(props: ButtonProps) {
  const { label, kind = 'quiet', icon, iconOnly, busy, disabled, wide, ...rest } = props;
  const { palette } = useTheme();
  const [hovered, setHovered] = useState(false);
  const [focused, setFocused] = useState(false);
  const off = disabled || busy;
  const tone = textTone[kind];
  const filled = kind === 'primary';
  const ground = filled ? palette.petrol : kind === 'plain' ? 'transparent' : palette.sheet;
  return (
    <Pressable
      role="button"
      aria-label={spokenLabel(props)}
      aria-busy={busy}
      {...rest}
      disabled={off}
      onHoverIn={() => setHovered(true)}
      onHoverOut={() => setHovered(false)}
      onFocus={(event) => {
        setFocused(isFocusVisible(event.target));
        rest.onFocus?.(event);
      }}
      onBlur={(event) => {
        setFocused(false);
        rest.onBlur?.(event);
      }}
      style={({ pressed }) => [
        styles.base,
        iconOnly ? styles.iconOnly : null,
        wide ? styles.wide : null,
        {
          backgroundColor: ground,
          borderColor: kind === 'plain' ? 'transparent' : filled ? palette.petrol : palette.rule,
        },
        hovered && !off && !filled ? { backgroundColor: palette.well } : null,
        !off && (pressed || (hovered && filled)) ? styles.pressed : null,
      ]}
    >
      <View style={[styles.content, disabled ? styles.disabled : null]}>
        {icon ? <Icon name={icon} size={20} tone={tone} /> : null}
        {iconOnly ? null : (
          <Text variant="label" strong tone={tone} style={styles.text}>
            {label}
          </Text>
        )}
      </View>
      {busy ? (
        <View style={[styles.busy, { backgroundColor: ground }]}>
          <ActivityIndicator size="small" color={toneColour(palette, tone)} />
        </View>
      ) : null}
      {iconOnly && !off && (hovered || focused) ? <Hint text={label} /> : null}
    </Pressable>
  );
}

/** True for focus that came by the keyboard: a press or an opening dialog does not call the hint up. */
function isFocusVisible(target: unknown): boolean {
  return typeof Element !== 'undefined' && target instanceof Element && target.matches(':focus-visible');
}

/** A button that cannot be pressed hears no pointer: what is around it tells why, under the pointer or at a touch. */
function Explained({ reason, wide, children }: { reason: string; wide?: boolean; children: ReactNode }) {
  const [shown, setShown] = useState(false);
  const hear = {
    onMouseEnter: () => setShown(true),
    onMouseLeave: () => setShown(false),
    onTouchStart: () => setShown(true),
    onTouchEnd: () => setTimeout(() => setShown(false), HINT_MS),
  };
  return (
    <View {...web(hear)} style={wide ? styles.wide : null}>
      <View pointerEvents="none">{children}</View>
      {shown ? <Hint text={reason} /> : null}
    </View>
  );
}

const HINT_MS = 2500;

/** Words under a button that shows none, or that cannot be pressed. The screen reader has them from the label. */
function Hint({ text }: { text: string }) {
  const { palette } = useTheme();
  return (
    <View pointerEvents="none" aria-hidden style={styles.hintPlace}>
      <View style={[styles.hint, OWN_WIDTH, { backgroundColor: palette.ink }]}>
        <Text variant="small" style={{ color: palette.sheet }}>
          {text}
        </Text>
      </View>
    </View>
  );
}

function spokenLabel({ label, iconOnly, disabled, reason, ...rest }: ButtonProps): string | undefined {
  const given = rest['aria-label'];
  if (disabled && reason) return `${given ?? label}. ${reason}`;
  return given ?? (iconOnly ? label : undefined);
}

const textTone: Record<ButtonKind, Tone> = {
  primary: 'onPetrol',
  quiet: 'petrol',
  danger: 'vermilion',
  plain: 'petrol',
};

/** As wide as its words, not as its button; React Native's types do not know it. */
const OWN_WIDTH: object = { width: 'max-content' };

const styles = StyleSheet.create({
  base: {
    minHeight: touchTarget,
    minWidth: touchTarget,
    paddingHorizontal: space.l,
    paddingVertical: space.s,
    borderRadius: radius,
    borderWidth: hairline,
    alignItems: 'center',
    justifyContent: 'center',
  },
  content: { flexDirection: 'row', alignItems: 'center', justifyContent: 'center', gap: space.s },
  iconOnly: { paddingHorizontal: space.s },
  wide: { alignSelf: 'stretch' },
  text: { fontSize: 15, textAlign: 'center', flexShrink: 1 },
  pressed: { opacity: 0.88 },
  disabled: { opacity: 0.55 },
  busy: { ...StyleSheet.absoluteFill, alignItems: 'center', justifyContent: 'center', borderRadius: radius },
  hintPlace: { position: 'absolute', top: '100%', right: 0, zIndex: 10, paddingTop: space.xs },
  hint: {
    borderRadius: radius,
    paddingHorizontal: space.s,
    paddingVertical: space.xs,
    maxWidth: 220,
  },
});
