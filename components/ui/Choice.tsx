import { useId } from 'react';
import { Pressable, StyleSheet, View } from 'react-native';
import { fonts, hairline, radius, space, touchTarget, typeScale } from '@/constants/theme';
import { Label } from './Label';
import { Text } from './Text';
import { useTheme } from './ThemeProvider';
import { web } from './web-props';

export interface ChoiceOption<T extends string> {
  value: T;
  label: string;
}

export interface ChoiceProps<T extends string> {
  label: string;
  options: readonly ChoiceOption<T>[];
  /** '' or undefined: nothing chosen yet. */
  value: T | '' | undefined;
  onChange: (value: T) => void;
  /** segments: few short options side by side; select: the browser's own list, good with many. */
  shape?: 'segments' | 'select';
  /** The first line of an empty select. */
  placeholder?: string;
  hint?: string;
  error?: string;
  disabled?: boolean;
  labelHidden?: boolean;
}

/** One of several. */
export function Choice<T extends string>(props: ChoiceProps<T>) {
  const id = useId();
  const [hintId, errorId] = [`${id}hint`, `${id}error`];
  const control =
    props.shape === 'segments' ? (
      <Segments {...props} />
    ) : (
      <Select {...props} errorId={errorId} hintId={hintId} />
    );
  if (props.labelHidden) return control;
  return (
    <Label label={props.label} hint={props.hint} error={props.error} hintId={hintId} errorId={errorId}>
      {control}
    </Label>
  );
}

function Segments<T extends string>({ label, options, value, onChange, disabled }: ChoiceProps<T>) {
  const { palette } = useTheme();
  const move = (step: number) => {
    const at = options.findIndex((option) => option.value === value);
    const next = options[(at + step + options.length) % options.length];
    if (next) onChange(next.value);
  };
  return (
    <View
      role="radiogroup"
      aria-label={label}
      style={styles.segments}
      {...web({
        onKeyDown: (event) => {
          const step = { ArrowRight: 1, ArrowDown: 1, ArrowLeft: -1, ArrowUp: -1 }[event.key];
          if (!step || disabled) return;
          event.preventDefault();
          move(step);
        },
      })}
    >
      {options.map((option) => {
        const chosen = option.value === value;
        return (
          <Pressable
            key={option.value}
            role="radio"
            aria-checked={chosen}
            disabled={disabled}
            onPress={() => onChange(option.value)}
            style={[
              styles.segment,
              {
                borderColor: chosen ? palette.ink : palette.rule,
                backgroundColor: chosen ? palette.ink : palette.sheet,
              },
              disabled ? styles.off : null,
            ]}
          >
            <Text variant="label" strong style={{ color: chosen ? palette.sheet : palette.inkSoft }}>
              {option.label}
            </Text>
          </Pressable>
        );
      })}
    </View>
  );
}

function Select<T extends string>({
  label,
  options,
  value,
  onChange,
  placeholder,
  error,
  errorId,
  hint,
  hintId,
  disabled,
}: ChoiceProps<T> & { errorId: string; hintId: string }) {
  const { palette } = useTheme();
  const arrow = encodeURIComponent(
    `<svg xmlns='http://www.w3.org/2000/svg' width='12' height='8'><path d='M1 1.5l5 5 5-5' fill='none' stroke='${palette.inkSoft}' stroke-width='1.75'/></svg>`,
  );
  return (
    <select
      aria-label={label}
      aria-invalid={Boolean(error)}
      aria-describedby={[error ? errorId : '', hint ? hintId : ''].filter(Boolean).join(' ') || undefined}
      disabled={disabled}
      value={value ?? ''}
      onChange={(event) => onChange(event.target.value as T)}
      style={{
        appearance: 'none',
        minHeight: touchTarget,
        width: '100%',
        boxSizing: 'border-box',
        borderRadius: radius,
        border: `${hairline}px solid ${error ? palette.vermilion : palette.rule}`,
        background: disabled
          ? palette.sheet
          : `${palette.well} url("data:image/svg+xml,${arrow}") no-repeat right 14px center`,
        color: palette.ink,
        fontFamily: fonts.label,
        fontSize: typeScale.body,
        padding: `${space.s}px 36px ${space.s}px ${space.m}px`,
        textOverflow: 'ellipsis',
        opacity: 1, // browsers fade what is disabled
      }}
    >
      {placeholder !== undefined ? <option value="">{placeholder}</option> : null}
      {options.map((option) => (
        <option key={option.value} value={option.value}>
          {option.label}
        </option>
      ))}
    </select>
  );
}

const styles = StyleSheet.create({
  segments: { flexDirection: 'row', flexWrap: 'wrap', gap: space.s },
  segment: {
    minHeight: touchTarget,
    minWidth: touchTarget,
    paddingHorizontal: space.l,
    paddingVertical: space.s,
    borderRadius: radius,
    borderWidth: hairline,
    alignItems: 'center',
    justifyContent: 'center',
  },
  off: { opacity: 0.6 },
});
