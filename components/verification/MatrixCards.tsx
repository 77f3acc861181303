import { StyleSheet, View } from 'react-native';
import { Card } from '@/components/ui/Card';
import { Figures } from '@/components/ui/Figures';
import { Text } from '@/components/ui/Text';
import { space } from '@/constants/theme';
import { scheduleWords } from '@/shared/requirements/metric-words';
import { CellButton } from './CellButton';
import type { MatrixProps } from './MatrixTable';

/** Narrow: one card a requirement, its recordings one under the other. */
export function MatrixCards({ verification, onOpen }: MatrixProps) {
  const { requirements, recordings, cells } = verification;
  return (
    <>
      {requirements.map((requirement) => (
        <Card key={requirement.id} title={requirement.name}>
          <Figures variant="label" tone="soft">
            {requirement.sentence}
          </Figures>
          <Figures variant="small" tone="soft">
            {scheduleWords(requirement.schedule)}
          </Figures>
          {cells
            .filter(({ requirementId }) => requirementId === requirement.id)
            .map((cell) => {
              const name = recordings.find(({ id }) => id === cell.recordingId)?.name ?? '';
              return (
                <View key={cell.recordingId} style={styles.row}>
                  <Text variant="label" style={styles.name}>
                    {name}
                  </Text>
                  <View style={styles.cell}>
                    <CellButton
                      cell={cell}
                      requirement={requirement}
                      recordingName={name}
                      onPress={() => onOpen(cell)}
                    />
                  </View>
                </View>
              );
            })}
        </Card>
      ))}
    </>
  );
}

const styles = StyleSheet.create({
  row: { flexDirection: 'row', alignItems: 'center', gap: space.m },
  name: { flex: 1, minWidth: 0 },
  cell: { flex: 1, minWidth: 0 },
});
