import { StyleSheet, View } from 'react-native';
import { Card } from '@/components/ui/Card';
import { ErrorState } from '@/components/ui/ErrorState';
import { Figures } from '@/components/ui/Figures';
import { formatMoment } from '@/components/ui/format-day';
import { Text } from '@/components/ui/Text';
import { space } from '@/constants/theme';
import { useVersionHistory, type VersionRef } from '@/hooks/versions';
import { actionWords } from '@/shared/audit-words';

/** Who did what to a version, and when, oldest first. */
export function HistoryCard({ of }: { of: VersionRef }) {
  const history = useVersionHistory(of);
  return (
    <Card title="History">
      {history.isError ? (
        <ErrorState
          title="The history could not be loaded"
          error={history.error}
          onRetry={() => void history.refetch()}
        />
      ) : null}
      {history.data?.items.map((entry) => (
        <View key={entry.id} style={styles.entry}>
          <Text variant="label" strong>
            {actionWords(entry.action)}
          </Text>
          <Figures variant="label" tone="soft">{`${entry.actor}, ${formatMoment(entry.at)}`}</Figures>
        </View>
      ))}
    </Card>
  );
}

const styles = StyleSheet.create({ entry: { paddingVertical: space.xs } });
