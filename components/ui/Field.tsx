import { useId, type Ref } from 'react';
import { StyleSheet, TextInput, View, type TextInputProps } from 'react-native';
import { fonts, hairline, radius, space, touchTarget, typeScale } from '@/constants/theme';
import { Icon, type IconName } from './Icon';
import { Label } from './Label';
import { useTheme } from './ThemeProvider';
import { web } from './web-props';

export interface FieldProps extends Omit<TextInputProps, 'style' | 'autoComplete'> {
  label: string;
  /** Shown with the label and read out. */
  unit?: string;
  error?: string;
  hint?: string;
  required?: boolean;
  /** Digits: set in the mono face (a placeholder's words are not), decimal keyboard on the phone. */
  numeric?: boolean;
  icon?: IconName;
  /** Hides the label from sight (a search field); the screen reader keeps it. */
  labelHidden?: boolean;
  /** The HTML autocomplete token: `username`, `current-password` … */
  autoComplete?: string;
  ref?: Ref<TextInput>;
}

/** One line (or several) of input. Works on its own and under react-hook-form's Controller. */
export function Field({
  label,
  unit,
  error,
  hint,
  required,
  numeric,
  icon,
  labelHidden,
  autoComplete,
  multiline,
  editable = true,
  ref,
  ...rest
}: FieldProps) {
  const { palette } = useTheme();
  const id = useId();
  const [hintId, errorId] = [`${id}hint`, `${id}error`];
  const input = (
    <View>
      {icon ? (
        <View style={styles.icon} pointerEvents="none">
          <Icon name={icon} size={20} tone="soft" />
        </View>
      ) : null}
      <TextInput
        ref={ref}
        aria-label={unit ? `${label}, ${unit}` : label}
        inputMode={numeric ? 'decimal' : undefined}
        editable={editable}
        multiline={multiline}
        placeholderTextColor={palette.inkSoft}
        {...web({
          'aria-invalid': Boolean(error),
          'aria-required': required,
          'aria-describedby':
            [error ? errorId : '', hint ? hintId : ''].filter(Boolean).join(' ') || undefined,
          autoComplete,
        })}
        {...rest}
        style={[
          styles.input,
          icon ? styles.withIcon : null,
          multiline ? styles.multiline : null,
          numeric && rest.value !== '' ? styles.numeric : null,
          {
            color: palette.ink,
            backgroundColor: palette.well,
            borderColor: error ? palette.vermilion : palette.rule,
          },
          editable ? null : { backgroundColor: palette.sheet },
        ]}
      />
    </View>
  );
  if (labelHidden) return input;
  return (
    <Label label={label} unit={unit} hint={hint} error={error} hintId={hintId} errorId={errorId}>
      {input}
    </Label>
  );
}

const styles = StyleSheet.create({
  input: {
    minHeight: touchTarget,
    borderRadius: radius,
    borderWidth: hairline,
    paddingHorizontal: space.m,
    paddingVertical: space.s,
    fontFamily: fonts.text,
    fontSize: typeScale.body,
    minWidth: 0,
    width: '100%',
  },
  numeric: { fontFamily: fonts.number },
  multiline: { minHeight: 96, textAlignVertical: 'top', paddingTop: space.m },
  icon: { position: 'absolute', left: space.m, top: 0, bottom: 0, justifyContent: 'center', zIndex: 1 },
  withIcon: { paddingLeft: 40 },
});
