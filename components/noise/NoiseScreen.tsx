import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { ChartOrigin, originOf } from '@/components/charts/chart-origin';
import { FirstHint } from '@/components/layout/FirstHint';
import { recordingPath } from '@/components/layout/paths';
import { Screen } from '@/components/layout/Screen';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import type { Stretch } from '@/components/strip/stretches';
import { Card } from '@/components/ui/Card';
import { ErrorState } from '@/components/ui/ErrorState';
import { Notice } from '@/components/ui/Notice';
import { Progress } from '@/components/ui/Progress';
import { SkeletonList } from '@/components/ui/Skeleton';
import { Text } from '@/components/ui/Text';
import { space } from '@/constants/theme';
import { useNoise } from '@/hooks/noise';
import { useRecording } from '@/hooks/recordings';
import { useDebounced } from '@/hooks/use-debounced';
import { useVehicle } from '@/hooks/vehicles';
import type { Recording } from '@/shared/contracts/recordings';
import { AllanCard } from './AllanCard';
import { SENSOR_NAMES } from './sensors';
import { NoiseActions } from './NoiseActions';
import { StretchCard } from './StretchCard';
import { TermsCard } from './TermsCard';

/** Sensor noise from a stretch at rest: Allan curves, the terms they support, and what to do with them. */
export function NoiseScreen({ id }: { id: string }) {
  const recording = useRecording(id);
  const back = recordingPath(id);
  if (recording.isPending)
    return (
      <Screen title="Sensor noise" back={back}>
        <SkeletonList label="the recording" rows={2} height={160} />
      </Screen>
    );
  if (recording.isError)
    return (
      <Screen title="Sensor noise" back="/recordings">
        <ErrorState
          title="This recording cannot be shown"
          error={recording.error}
          onRetry={() => void recording.refetch()}
        />
      </Screen>
    );
  if (recording.data.status !== 'ready')
    return (
      <Screen title="Sensor noise" subtitle={recording.data.name} back={back}>
        <Notice tone="ochre" title="Not decoded yet">
          The noise is found in the decoded samples. Look again when the recording is ready.
        </Notice>
      </Screen>
    );
  return <Loaded key={id} recording={recording.data} />;
}

function Loaded({ recording }: { recording: Recording }) {
  const { extraWide } = useBreakpoint();
  const [span, setSpan] = useState<Stretch | null>(null);
  // A key held down moves an edge many times; only where it comes to rest is analysed.
  const settled = useDebounced(span, 400);
  const longest = useNoise(recording.id, null);
  const noise = useNoise(recording.id, settled);
  const vehicle = useVehicle(recording.vehicleId ?? '');
  const datasheet = vehicle.data?.sensor?.datasheet ?? null;
  const analysis = noise.data;
  return (
    <Screen
      title="Sensor noise"
      subtitle={recording.name}
      back={recordingPath(recording.id)}
      actions={
        analysis ? (
          <NoiseActions recording={recording} vehicle={vehicle.data ?? null} analysis={analysis} />
        ) : undefined
      }
    >
      <FirstHint hint="noise" />
      <StretchCard
        recording={recording}
        found={longest.isPending ? null : (longest.data?.stretchesS ?? [])}
        chosen={span}
        analysis={analysis ?? null}
        onChoose={setSpan}
      />
      {noise.isPending ? (
        <Card>
          <Progress label="Working out the Allan deviation of six axes" />
        </Card>
      ) : null}
      {noise.isError ? (
        <ErrorState title="No noise was found" error={noise.error} onRetry={() => void noise.refetch()} />
      ) : null}
      {analysis ? (
        <>
          <View style={extraWide ? styles.columns : styles.stack}>
            {SENSOR_NAMES.map((sensor) => (
              <View key={sensor} style={extraWide ? styles.column : null}>
                <ChartOrigin.Provider value={originOf(recording.name)}>
                  <AllanCard sensor={sensor} analysis={analysis} datasheet={datasheet} />
                </ChartOrigin.Provider>
              </View>
            ))}
          </View>
          <View style={extraWide ? styles.columns : styles.stack}>
            {SENSOR_NAMES.map((sensor) => (
              <View key={sensor} style={extraWide ? styles.column : null}>
                <TermsCard sensor={sensor} analysis={analysis} datasheet={datasheet} />
              </View>
            ))}
          </View>
          <Card title="What to know of these figures">
            {analysis.notes.map((note) => (
              <Text key={note}>{note}</Text>
            ))}
            <Text variant="label" tone="soft">
              Overlapping Allan deviation and its terms as IEEE Std 952 defines them. The terms are fitted
              together, weighted by their confidence; one that the stretch cannot tell has no number. Bars are
              68 %.
            </Text>
          </Card>
        </>
      ) : null}
    </Screen>
  );
}

const styles = StyleSheet.create({
  columns: { flexDirection: 'row', gap: space.l, alignItems: 'stretch' },
  column: { flex: 1, minWidth: 0 },
  stack: { gap: space.l },
});
