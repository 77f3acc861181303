import { Pressable, StyleSheet, View } from 'react-native';
import { ErrorState } from '@/components/ui/ErrorState';
import { Figures } from '@/components/ui/Figures';
import { Sheet } from '@/components/ui/Sheet';
import { SkeletonList } from '@/components/ui/Skeleton';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, radius, space } from '@/constants/theme';
import { itemsOf, useRecordings } from '@/hooks/recordings';
import type { Recording } from '@/shared/contracts/recordings';
import { sourceLine } from './RecordingCard';
import { StripBox } from './StripBox';

export interface RecordingPickerProps {
  title: string;
  onPick: (recording: Recording) => void;
  onClose: () => void;
}

/** A sheet with the decoded recordings, told apart by their strips. */
export function RecordingPicker({ title, onPick, onClose }: RecordingPickerProps) {
  const recordings = useRecordings();
  const ready = itemsOf(recordings.data).filter((recording) => recording.status === 'ready');
  return (
    <Sheet open title={title} onClose={onClose}>
      {recordings.isPending ? <SkeletonList label="recordings" rows={3} /> : null}
      {recordings.isError ? (
        <ErrorState title="The recordings could not be loaded" error={recordings.error} />
      ) : null}
      {recordings.isSuccess && ready.length === 0 ? (
        <Text tone="soft">No recording is decoded yet.</Text>
      ) : null}
      {ready.map((recording) => (
        <Row key={recording.id} recording={recording} onPick={onPick} />
      ))}
    </Sheet>
  );
}

function Row({ recording, onPick }: { recording: Recording; onPick: (recording: Recording) => void }) {
  const { palette } = useTheme();
  return (
    <Pressable
      role="button"
      aria-label={`${recording.name}, ${sourceLine(recording)}`}
      onPress={() => onPick(recording)}
      style={({ pressed }) => [
        styles.row,
        { borderColor: palette.rule },
        pressed ? { backgroundColor: palette.well } : null,
      ]}
    >
      <Text strong>{recording.name}</Text>
      <Figures tone="soft">{sourceLine(recording)}</Figures>
      <View style={{ height: space.xs }} />
      {recording.strip ? <StripBox strip={recording.strip} height={32} compact /> : null}
    </Pressable>
  );
}

const styles = StyleSheet.create({
  row: { padding: space.m, borderWidth: hairline, borderRadius: radius },
});
