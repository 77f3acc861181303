import { Pressable, StyleSheet, View } from 'react-native';
import { sourceLine } from '@/components/recordings/RecordingCard';
import { StripBox } from '@/components/recordings/StripBox';
import { ErrorState } from '@/components/ui/ErrorState';
import { Figures } from '@/components/ui/Figures';
import { Icon } from '@/components/ui/Icon';
import { SkeletonList } from '@/components/ui/Skeleton';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, radius, space } from '@/constants/theme';
import { itemsOf, useRecordings } from '@/hooks/recordings';

export interface RecordingChoiceProps {
  value: readonly string[];
  onChange: (ids: string[]) => void;
  error?: string;
}

/** Decoded recordings, any number of them. */
export function RecordingChoice({ value, onChange, error }: RecordingChoiceProps) {
  const { palette } = useTheme();
  const recordings = useRecordings();
  const ready = itemsOf(recordings.data).filter(({ status }) => status === 'ready');
  return (
    <View role="group" aria-label="Recordings" style={styles.list}>
      {recordings.isPending ? <SkeletonList label="recordings" rows={2} /> : null}
      {recordings.isError ? (
        <ErrorState title="The recordings could not be loaded" error={recordings.error} />
      ) : null}
      {recordings.isSuccess && ready.length === 0 ? (
        <Text tone="soft">No recording is decoded yet: upload one first.</Text>
      ) : null}
      {ready.map((recording) => {
        const chosen = value.includes(recording.id);
        return (
          <Pressable
            key={recording.id}
            role="checkbox"
            aria-checked={chosen}
            aria-label={`${recording.name}, ${sourceLine(recording)}`}
            onPress={() =>
              onChange(chosen ? value.filter((id) => id !== recording.id) : [...value, recording.id])
            }
            style={[styles.row, { borderColor: chosen ? palette.petrol : palette.rule }]}
          >
            <View style={[styles.box, { borderColor: palette.inkSoft }]}>
              {chosen ? <Icon name="check" tone="petrol" size={20} /> : null}
            </View>
            <View style={styles.words}>
              <Text strong>{recording.name}</Text>
              <Figures tone="soft">{sourceLine(recording)}</Figures>
              {recording.strip ? <StripBox strip={recording.strip} height={28} compact /> : null}
            </View>
          </Pressable>
        );
      })}
      {error ? (
        <Text variant="label" tone="vermilion" role="alert">
          {error}
        </Text>
      ) : null}
    </View>
  );
}

const styles = StyleSheet.create({
  list: { gap: space.s },
  row: {
    flexDirection: 'row',
    alignItems: 'center',
    gap: space.m,
    padding: space.m,
    borderWidth: hairline,
    borderRadius: radius,
  },
  box: {
    width: 24,
    height: 24,
    borderWidth: hairline,
    borderRadius: 4,
    alignItems: 'center',
    justifyContent: 'center',
  },
  words: { flex: 1, minWidth: 0 },
});
