import { useEffect, useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { ChartOrigin } from '@/components/charts/chart-origin';
import { useShortcuts } from '@/components/keyboard/use-shortcuts';
import { Screen } from '@/components/layout/Screen';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { Figures } from '@/components/ui/Figures';
import { space } from '@/constants/theme';
import { useToast } from '@/components/ui/ToastProvider';
import type { Run } from '@/shared/contracts/runs';
import { formatDuration } from '@/shared/format';
import { HistoryActions, SaveAction } from './BenchActions';
import type { BenchStart } from './bench-start';
import { CompanyBar } from './CompanyBar';
import { followWords, useFollow, useFollowed } from './use-follow';
import { WIDE_VIEWS, type ViewId } from './chart-views';
import { PhoneBench } from './PhoneBench';
import { RunStatus } from './RunStatus';
import { useBench } from './use-bench';
import { useRunOrigin } from './use-run-origin';
import { useBenchAddress, type OwnQueries } from './use-bench-address';
import { WideBench } from './WideBench';

export interface BenchViewProps {
  start: BenchStart;
  /** Why nothing can be changed here; null: all can. */
  locked: string | null;
  /** The finished run that is shown to those who may start none. */
  shown: Run | null;
  own: OwnQueries;
}

/** The open bench. */
export function BenchView({ start, locked, shown, own }: BenchViewProps) {
  const { wide } = useBreakpoint();
  const toast = useToast();
  const [followed, setFollowed] = useFollowed();
  const bench = useBench(start, locked ?? (followed ? followWords(followed) : null), shown);
  const company = useFollow(bench, followed, setFollowed);
  const [view, setView] = useState<ViewId>(
    () => WIDE_VIEWS.find((one) => one.id === start.view)?.id ?? 'overview',
  );
  const origin = useRunOrigin(bench);
  useBenchAddress(bench, view, own);
  useShortcuts({
    a: () => bench.group.viewport.reset(),
    ...Object.fromEntries(WIDE_VIEWS.map(({ id }, i) => [String(i + 1), () => setView(id)])),
  });
  const notes = start.notes.join(' ');
  useEffect(() => {
    if (notes) toast({ message: notes, tone: 'ochre' });
  }, [notes, toast]);
  const Body = wide ? WideBench : PhoneBench;
  return (
    <Screen
      title={start.recording.name}
      subtitle={
        <View style={styles.lines}>
          {wide ? (
            <Figures variant="label" tone="soft">
              {recordingWords(start)}
            </Figures>
          ) : null}
          <RunStatus bench={bench} short={!wide} />
        </View>
      }
      back={wide ? undefined : '/recordings'}
      actions={
        <>
          {wide ? <HistoryActions bench={bench} /> : null}
          <SaveAction bench={bench} label={wide ? 'Save version' : 'Save'} />
        </>
      }
      width="full"
      scroll={false}
    >
      <ChartOrigin.Provider value={origin}>
        <CompanyBar company={company} followed={followed} />
        <Body bench={bench} view={view} onView={setView} />
      </ChartOrigin.Provider>
    </Screen>
  );
}

function recordingWords({ recording }: BenchStart): string {
  const { health } = recording;
  return [
    recording.vehicleName,
    recording.durationS === null ? null : formatDuration(recording.durationS),
    health ? `${rate(health.imu.rateHz)} IMU, ${rate(health.gnss.rateHz)} GNSS` : null,
  ]
    .filter(Boolean)
    .join(' · ');
}

/** 5 Hz, 99.8 Hz: three digits, none that say nothing. */
const rate = (hz: number) => `${Number(hz.toPrecision(3))} Hz`;

const styles = StyleSheet.create({ lines: { flexDirection: 'row', flexWrap: 'wrap', columnGap: space.m } });
