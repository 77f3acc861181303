import type { ReactNode } from 'react';
import { View } from 'react-native';
import { space } from '@/constants/theme';
import { Text } from './Text';

export interface LabelProps {
  label: string;
  unit?: string;
  hint?: string;
  error?: string;
  /** Ids that the control names in aria-describedby. */
  hintId: string;
  errorId: string;
  children: ReactNode;
}

/** Label with its unit above a control, hint and error below it. */
export function Label({ label, unit, hint, error, hintId, errorId, children }: LabelProps) {
  return (
    <View style={{ gap: space.xs }}>
      <Text variant="label" strong aria-hidden>
        {label}
        {unit ? <Text variant="label" tone="soft">{` (${unit})`}</Text> : null}
      </Text>
      {children}
      {error ? (
        <Text variant="label" tone="vermilion" nativeID={errorId} role="alert">
          {error}
        </Text>
      ) : null}
      {hint ? (
        <Text variant="label" tone="soft" nativeID={hintId}>
          {hint}
        </Text>
      ) : null}
    </View>
  );
}
