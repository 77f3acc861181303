import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { Figures } from '@/components/ui/Figures';
import { Notice } from '@/components/ui/Notice';
import { useTheme } from '@/components/ui/ThemeProvider';
import { motionMs, space } from '@/constants/theme';
import { formatNumber } from '@/shared/format';
import { useLive } from '@/hooks/use-live-run';
import type { Bench } from './use-bench';

/** In a line how the run goes: "Run done in 0.28 s (4 430 × real time) · against baseline Harbour v6". */
export function RunStatus({ bench, short }: { bench: Bench; short?: boolean }) {
  const phase = useLive(bench.live, (state) => state.phase);
  const tookS = useLive(bench.live, (state) => state.tookS);
  const summary = useLive(bench.live, (state) => state.summary);
  const percent = useLive(bench.live, (state) => Math.floor(state.progress * 20) * 5);
  const took = bench.locked === null ? tookS : (summary?.computeS ?? null);
  const speed = took && summary && !short ? ` (${formatNumber(summary.durationS / took)} × real time)` : '';
  const connected = useLive(bench.live, (state) => state.connected);
  const byPhase = {
    idle: 'Waiting for the first run',
    starting: 'Starting a run …',
    running: `Run under way, ${percent} %`,
    done: took === null ? 'Run done' : `Run done in ${formatNumber(took, 2)} s${speed}`,
    failed: 'The last run failed',
    cancelled: 'The run was stopped',
  };
  const words = connected ? byPhase[phase] : 'Connection lost, trying again …';
  return (
    <View style={styles.line} role="status" aria-live="off">
      <Figures variant="label" tone="soft">{`${words} · against ${bench.baseline.name}`}</Figures>
    </View>
  );
}

/** A hairline over the charts that fills while the run goes. */
export function RunProgressLine({ bench }: { bench: Bench }) {
  const { palette } = useTheme();
  const running = useLive(
    bench.live,
    ({ phase, connected }) => connected && (phase === 'running' || phase === 'starting'),
  );
  const percent = useLive(bench.live, (state) => Math.round(state.progress * 100));
  return (
    <View
      role="progressbar"
      aria-label="Run"
      aria-valuemin={0}
      aria-valuemax={100}
      aria-valuenow={running ? percent : 100}
      style={styles.track}
    >
      <View
        style={{
          height: 2,
          width: `${running ? percent : 100}%`,
          backgroundColor: palette.petrol,
          opacity: running ? 1 : 0,
          transitionProperty: 'opacity',
          transitionDuration: `${motionMs}ms`,
        }}
      />
    </View>
  );
}

/** What went wrong with the last run, in plain words, and the way on. The curves of the run before stay. */
export function RunProblem({ bench }: { bench: Bench }) {
  const phase = useLive(bench.live, (state) => state.phase);
  const reason = useLive(bench.live, (state) => state.reason);
  const kept = useLive(bench.live, (state) => state.summary !== null);
  const connected = useLive(bench.live, (state) => state.connected);
  const unsent = useLive(bench.live, (state) => state.unsent);
  if (!connected) return <ConnectionLost underWay={phase === 'running'} unsent={unsent} />;
  if (phase !== 'failed' && phase !== 'cancelled') return null;
  return (
    <Notice
      tone={phase === 'failed' ? 'vermilion' : 'ochre'}
      urgent
      title={phase === 'failed' ? 'The run failed' : 'The run was stopped'}
      actions={
        <>
          {bench.locked === null ? <Button label="Run again" onPress={() => bench.live.retry()} /> : null}
          {bench.canUndo ? <Button label="Undo the last change" icon="undo" onPress={bench.undo} /> : null}
        </>
      }
    >
      {`${reason ?? 'No reason was given.'}${kept ? ' The curves and figures shown are those of the run before.' : ''}`}
    </Notice>
  );
}

/** The server is away: what that means for the run, and what happens next. */
function ConnectionLost({ underWay, unsent }: { underWay: boolean; unsent: boolean }) {
  const next = unsent
    ? 'Your last change could not be sent: it runs as soon as the server answers.'
    : underWay
      ? 'The run may have ended with it. As soon as the server answers, the bench takes the run up again, or says that it was lost and offers to run it again.'
      : 'What you change meanwhile runs as soon as the server answers.';
  return (
    <Notice tone="vermilion" urgent title="The connection to the server is lost">
      {`${next} The bench keeps trying by itself; what you have set and the curves drawn so far stay.`}
    </Notice>
  );
}

const styles = StyleSheet.create({
  line: { flexDirection: 'row', flexWrap: 'wrap' },
  track: { height: 2, marginTop: -space.xs, marginBottom: -space.xs },
});
