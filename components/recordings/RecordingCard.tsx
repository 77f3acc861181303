import { StyleSheet, View } from 'react-native';
import { recordingPath } from '@/components/layout/paths';
import { CardLink } from '@/components/ui/CardLink';
import { formatDay } from '@/components/ui/format-day';
import { Figures } from '@/components/ui/Figures';
import { Progress } from '@/components/ui/Progress';
import { Text } from '@/components/ui/Text';
import { space } from '@/constants/theme';
import { formatDuration } from '@/shared/format';
import type { Recording } from '@/shared/contracts/recordings';
import { StripBox } from './StripBox';
import { statusWord } from './status';

export interface RecordingCardProps {
  recording: Recording;
  /** Parameters of the list's address that its link carries on. */
  query?: Readonly<Record<string, string>>;
  current?: boolean;
}

/** One recording in a list: name, whose, when, how long, what it is good for, and its strip. */
export function RecordingCard({ recording, query, current }: RecordingCardProps) {
  const { word, tone } = statusWord(recording);
  const line = sourceLine(recording);
  return (
    <CardLink
      href={recordingPath(recording.id, query)}
      label={`${recording.name}, ${word}, ${line}`}
      current={current}
    >
      <View style={styles.head}>
        <Text variant="body" strong style={styles.name}>
          {recording.name}
        </Text>
        <Text variant="label" strong tone={tone}>
          {word}
        </Text>
      </View>
      <Figures tone="soft" style={styles.line}>
        {line}
      </Figures>
      <Body recording={recording} />
    </CardLink>
  );
}

function Body({ recording }: { recording: Recording }) {
  if (recording.strip) return <StripBox strip={recording.strip} height={44} compact />;
  if (recording.status === 'decoding' || recording.status === 'uploaded')
    return <Progress label={`Decoding ${recording.name}`} value={recording.progress} labelHidden />;
  const problem = recording.problems[0];
  return problem ? (
    <Text variant="label" tone="soft" numberOfLines={2}>
      {problem.message}
    </Text>
  ) : null;
}

/** "Crawler 2 · today 09:12 · 20 min 40 s" */
export function sourceLine(recording: Recording): string {
  return [
    recording.vehicleName,
    formatDay(recording.createdAt),
    recording.durationS === null ? null : formatDuration(recording.durationS),
  ]
    .filter(Boolean)
    .join(' · ');
}

const styles = StyleSheet.create({
  head: {
    flexDirection: 'row',
    flexWrap: 'wrap',
    alignItems: 'baseline',
    justifyContent: 'space-between',
    columnGap: space.m,
  },
  name: { fontSize: 17, flexShrink: 1 },
  line: { marginTop: -6 },
});
