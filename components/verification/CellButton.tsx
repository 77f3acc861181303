import { Pressable, StyleSheet } from 'react-native';
import { Figures } from '@/components/ui/Figures';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, radius, space, touchTarget } from '@/constants/theme';
import type { Verification, VerificationCell } from '@/shared/contracts/verification';
import { cellWords } from './cell-words';

export interface CellButtonProps {
  cell: VerificationCell;
  requirement: Verification['requirements'][number];
  recordingName: string;
  onPress: () => void;
}

/** A cell: its value and its verdict; opens what is behind. */
export function CellButton({ cell, requirement, recordingName, onPress }: CellButtonProps) {
  const { palette } = useTheme();
  const { verdict, tone, value, detail } = cellWords(cell, requirement.metric);
  return (
    <Pressable
      role="button"
      aria-label={[requirement.name, recordingName, verdict, value, detail].filter(Boolean).join(', ')}
      onPress={onPress}
      style={({ pressed }) => [
        styles.cell,
        { borderColor: palette.rule, backgroundColor: pressed ? palette.well : palette.sheet },
        { borderLeftColor: palette[tone === 'soft' ? 'rule' : tone] },
      ]}
    >
      {value ? (
        <Figures variant="body" strong>
          {value}
        </Figures>
      ) : null}
      <Text variant="label" strong tone={tone}>
        {verdict}
      </Text>
    </Pressable>
  );
}

const styles = StyleSheet.create({
  cell: {
    flex: 1,
    minHeight: touchTarget,
    justifyContent: 'center',
    borderWidth: hairline,
    borderLeftWidth: 3,
    borderRadius: radius,
    paddingHorizontal: space.m,
    paddingVertical: space.s,
  },
});
