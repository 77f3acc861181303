import { ScrollView, StyleSheet, View } from 'react-native';
import { Figures } from '@/components/ui/Figures';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, space } from '@/constants/theme';
import type { Verification, VerificationCell } from '@/shared/contracts/verification';
import { scheduleWords } from '@/shared/requirements/metric-words';
import { CellButton } from './CellButton';

export interface MatrixProps {
  verification: Verification;
  onOpen: (cell: VerificationCell) => void;
}

/** Wide: one row a requirement, one column a recording. */
export function MatrixTable({ verification, onOpen }: MatrixProps) {
  const { palette } = useTheme();
  const { requirements, recordings, cells } = verification;
  return (
    <ScrollView horizontal contentContainerStyle={styles.scroll}>
      <View role="table" aria-label="Verification matrix" style={styles.table}>
        <View role="row" style={[styles.row, { borderBottomColor: palette.ink }]}>
          <View role="columnheader" style={styles.name}>
            <Text variant="small" strong tone="soft">
              Requirement
            </Text>
          </View>
          {recordings.map(({ id, name }) => (
            <View key={id} role="columnheader" style={styles.cell}>
              <Text variant="label" strong numberOfLines={2}>
                {name}
              </Text>
            </View>
          ))}
        </View>
        {requirements.map((requirement) => (
          <View key={requirement.id} role="row" style={[styles.row, { borderBottomColor: palette.rule }]}>
            <View role="rowheader" style={styles.name}>
              <Text strong>{requirement.name}</Text>
              <Figures variant="label" tone="soft">
                {requirement.sentence}
              </Figures>
              <Figures variant="small" tone="soft">
                {scheduleWords(requirement.schedule)}
              </Figures>
            </View>
            {recordings.map((recording) => {
              const cell = cells.find(
                (one) => one.requirementId === requirement.id && one.recordingId === recording.id,
              );
              return (
                <View key={recording.id} role="cell" style={styles.cell}>
                  {cell ? (
                    <CellButton
                      cell={cell}
                      requirement={requirement}
                      recordingName={recording.name}
                      onPress={() => onOpen(cell)}
                    />
                  ) : (
                    <Text variant="small" tone="soft">
                      not judged on it
                    </Text>
                  )}
                </View>
              );
            })}
          </View>
        ))}
      </View>
    </ScrollView>
  );
}

const styles = StyleSheet.create({
  scroll: { flexGrow: 1 },
  table: { flexGrow: 1 },
  row: {
    flexDirection: 'row',
    alignItems: 'center',
    gap: space.m,
    paddingVertical: space.s,
    borderBottomWidth: hairline,
  },
  name: { width: 300, flexShrink: 0 },
  cell: { flexGrow: 1, flexBasis: 150, minWidth: 150 },
});
