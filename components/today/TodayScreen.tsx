import { router } from 'expo-router';
import { StyleSheet, View } from 'react-native';
import { Screen } from '@/components/layout/Screen';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { RecordingCard } from '@/components/recordings/RecordingCard';
import { SetCard } from '@/components/sets/SetCard';
import { Button } from '@/components/ui/Button';
import { ErrorState } from '@/components/ui/ErrorState';
import { SkeletonList } from '@/components/ui/Skeleton';
import { Text } from '@/components/ui/Text';
import { TextLink } from '@/components/ui/TextLink';
import { space } from '@/constants/theme';
import { useParameterSets } from '@/hooks/parameter-sets';
import { itemsOf, READY, useRecordings } from '@/hooks/recordings';
import { useCan, useSession } from '@/hooks/session';
import { FirstSteps } from './FirstSteps';
import { LastBench } from './LastBench';
import { useWaiting } from './use-waiting';
import { WaitingList } from './WaitingList';

const SHOWN = 4;

/** What waits for me, the last bench, what came last, what is being drafted. */
export function TodayScreen() {
  const session = useSession();
  const recordings = useRecordings(READY);
  const sets = useParameterSets({ state: 'draft' });
  const { waiting, pending, error, retry } = useWaiting();
  const mayUpload = useCan('recording:write');
  const latest = itemsOf(recordings.data);
  const drafts = itemsOf(sets.data).filter((set) => set.latest.state === 'draft');
  const empty = recordings.isSuccess && !pending && !error && latest.length + waiting.length === 0;
  return (
    <Screen
      title="Today"
      subtitle={`${session.workspace.name} · you are ${session.user.name}, ${session.workspace.role}`}
      actions={
        mayUpload && !empty ? (
          <Button
            label="Upload"
            kind="primary"
            icon="upload"
            onPress={() => router.push('/recordings/upload')}
          />
        ) : undefined
      }
    >
      {recordings.isPending ? <SkeletonList label="today" rows={3} /> : null}
      {recordings.isError ? (
        <ErrorState
          title="The recordings could not be loaded"
          error={recordings.error}
          onRetry={() => void recordings.refetch()}
        />
      ) : null}
      {empty ? <FirstSteps mayUpload={mayUpload} /> : null}
      {error ? <ErrorState title="Not all that waits could be loaded" error={error} onRetry={retry} /> : null}
      {empty || pending || (error && waiting.length === 0) ? null : (
        <WaitingList waiting={waiting} mayWrite={mayUpload} />
      )}
      <LastBench />
      {latest.length > 0 ? (
        <Section title="Latest recordings" link={<TextLink href="/recordings" label="All recordings" />}>
          {latest.slice(0, SHOWN).map((recording) => (
            <Cell key={recording.id}>
              <RecordingCard recording={recording} />
            </Cell>
          ))}
        </Section>
      ) : null}
      {sets.isError ? (
        <ErrorState
          title="The parameter sets could not be loaded"
          error={sets.error}
          onRetry={() => void sets.refetch()}
        />
      ) : null}
      {drafts.length > 0 ? (
        <Section title="Drafts" link={<TextLink href="/sets" label="All parameter sets" />}>
          {drafts.slice(0, SHOWN).map((set) => (
            <Cell key={set.id}>
              <SetCard set={set} />
            </Cell>
          ))}
        </Section>
      ) : null}
    </Screen>
  );
}

function Section({
  title,
  link,
  children,
}: {
  title: string;
  link: React.ReactNode;
  children: React.ReactNode;
}) {
  return (
    <View style={{ gap: space.s }}>
      <View style={styles.head}>
        <Text variant="heading">{title}</Text>
        {link}
      </View>
      <View style={styles.grid}>{children}</View>
    </View>
  );
}

function Cell({ children }: { children: React.ReactNode }) {
  const { wide } = useBreakpoint();
  return <View style={wide ? styles.half : styles.whole}>{children}</View>;
}

const styles = StyleSheet.create({
  head: {
    flexDirection: 'row',
    flexWrap: 'wrap',
    justifyContent: 'space-between',
    alignItems: 'center',
    columnGap: space.m,
  },
  grid: { flexDirection: 'row', flexWrap: 'wrap', gap: space.m },
  half: { flexBasis: '45%', flexGrow: 1, minWidth: 0 },
  whole: { width: '100%' },
});
