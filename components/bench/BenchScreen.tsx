import { useEffect, useState } from 'react';
import { Screen } from '@/components/layout/Screen';
import { EmptyState } from '@/components/ui/EmptyState';
import { ErrorState } from '@/components/ui/ErrorState';
import { SkeletonList } from '@/components/ui/Skeleton';
import { TextLink } from '@/components/ui/TextLink';
import { useParameterSet } from '@/hooks/parameter-sets';
import { isUnderWay, useRecording } from '@/hooks/recordings';
import { useRun, useRuns } from '@/hooks/runs';
import { useCan, useSession } from '@/hooks/session';
import type { Recording } from '@/shared/contracts/recordings';
import { readBenchQuery, type BenchQuery } from './bench-link';
import { resolveStart, type BenchStart } from './bench-start';
import { BenchView } from './BenchView';
import { rememberBench } from './last-bench';
import { OwnQueries, queryKey } from './use-bench-address';

export interface BenchScreenProps {
  recordingId: string;
  query: Partial<Record<keyof BenchQuery, string>>;
}

/** A bench by its address. A new link opens it anew; the queries that the bench writes itself do not. */
export function BenchScreen({ recordingId, query }: BenchScreenProps) {
  const [own] = useState(() => new OwnQueries());
  const key = queryKey(query);
  const [opened, setOpened] = useState({ recordingId, key, query, count: 0 });
  const foreign = recordingId !== opened.recordingId || (key !== opened.key && !own.isOwn(key));
  if (foreign) setOpened({ recordingId, key, query, count: opened.count + 1 });
  return <BenchLoader key={opened.count} recordingId={opened.recordingId} query={opened.query} own={own} />;
}

const READ_ONLY =
  'Your role reads: the bench shows a finished run. An engineer slides parameters and draws outages.';

function BenchLoader({ recordingId, query, own }: BenchScreenProps & { own: OwnQueries }) {
  const [{ link, problems }] = useState(() => readBenchQuery(recordingId, query));
  const mayRun = useCan('run:create');
  const recording = useRecording(recordingId);
  const set = useParameterSet(link.setId ?? '');
  const pinned = useRun(link.baselineRunId ?? null);
  const version = set.data?.versions.find(({ number }) => number === link.version);
  const shown = useShownRun(recordingId, version?.runId, mayRun);
  // Once open, a bench stays as it was opened: what is fetched again later does not start it anew.
  const [start, setStart] = useState<BenchStart | null>(null);

  const needed = [recording, ...(link.setId ? [set] : []), ...(link.baselineRunId ? [pinned] : [])];
  if (
    !start &&
    needed.every((one) => one.data) &&
    recording.data?.status === 'ready' &&
    recording.data.strip
  ) {
    const data = { ...recording.data, strip: recording.data.strip };
    const resolved = resolveStart(data, link, set.data ?? null, pinned.data ?? null);
    setStart({ ...resolved, notes: [...problems, ...resolved.notes] });
  }
  if (start && (mayRun || shown.run))
    return <BenchView start={start} locked={mayRun ? null : READ_ONLY} shown={shown.run} own={own} />;
  return (
    <Screen title="Bench">
      <Waiting
        recording={recording.data}
        failed={needed.find((one) => one.isError)}
        nothingToShow={start !== null && shown.ready}
      />
    </Screen>
  );
}

interface WaitingProps {
  recording: Recording | undefined;
  failed: { error: unknown; refetch: () => unknown } | undefined;
  nothingToShow: boolean;
}

/** In place of a bench that is not open (yet). */
function Waiting({ recording, failed, nothingToShow }: WaitingProps) {
  if (failed) return <Failed failed={failed} />;
  if (nothingToShow)
    return (
      <EmptyState
        title="No run to look at yet"
        message="Nobody has run the filter on this recording. Your role reads; an engineer opens the bench and runs it."
        icon="bench"
        actions={<TextLink href="/recordings" label="Back to the recordings" />}
      />
    );
  if (recording && recording.status !== 'ready' && !isUnderWay(recording))
    return (
      <EmptyState
        title={`${recording.name} cannot be filtered yet`}
        message={recording.problems[0]?.message ?? 'Its columns have to be mapped first.'}
        icon="recordings"
        actions={<TextLink href={`/recordings/${recording.id}`} label="Open the recording" />}
      />
    );
  return <SkeletonList label={recording ? `${recording.name}, still being decoded` : 'the bench'} rows={3} />;
}

function Failed({ failed }: { failed: NonNullable<WaitingProps['failed']> }) {
  const { id: workspaceId } = useSession().workspace;
  // What could not be opened must not be opened again by the Bench tab.
  useEffect(() => rememberBench(workspaceId, null), [workspaceId]);
  return (
    <>
      <ErrorState
        title="This bench could not be opened"
        error={failed.error}
        onRetry={() => void failed.refetch()}
      />
      <TextLink href="/bench" label="Choose another recording" />
    </>
  );
}

/** For those who may not run: the version's own run, else the newest finished one of the recording. */
function useShownRun(recordingId: string, versionRunId: string | null | undefined, mayRun: boolean) {
  const newest = useRuns({ recordingId, state: 'done', limit: 1 }, !mayRun && !versionRunId);
  const id = mayRun ? null : (versionRunId ?? newest.data?.items[0]?.id ?? null);
  const run = useRun(id);
  return { run: id ? (run.data ?? null) : null, ready: id ? !run.isPending : !newest.isPending };
}
