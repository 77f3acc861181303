import { router, useLocalSearchParams } from 'expo-router';
import { StyleSheet, View } from 'react-native';
import { useState } from 'react';
import { compareHref } from '@/components/compare/compare-link';
import { hrefOf } from '@/components/layout/paths';
import { Screen } from '@/components/layout/Screen';
import { RecordingPicker } from '@/components/recordings/RecordingPicker';
import { Button } from '@/components/ui/Button';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { ErrorState } from '@/components/ui/ErrorState';
import { Figures } from '@/components/ui/Figures';
import { SkeletonList } from '@/components/ui/Skeleton';
import { space } from '@/constants/theme';
import { useParameterSet } from '@/hooks/parameter-sets';
import type { ParameterSetDetail, ParameterSetVersion } from '@/shared/contracts/parameter-sets';
import { VersionCard } from './VersionCard';
import { VersionList } from './VersionList';

/** One set: its versions, and the open one in full. */
export function SetScreen({ id }: { id: string }) {
  const { wide } = useBreakpoint();
  const set = useParameterSet(id);
  if (set.isPending)
    return (
      <Screen title="Parameter set" back={wide ? undefined : '/sets'}>
        <SkeletonList label="the parameter set" rows={2} height={160} />
      </Screen>
    );
  if (set.isError)
    return (
      <Screen title="Parameter set" back="/sets">
        <ErrorState
          title="This parameter set cannot be shown"
          error={set.error}
          onRetry={() => void set.refetch()}
        />
      </Screen>
    );
  return <Loaded key={id} set={set.data} />;
}

function Loaded({ set }: { set: ParameterSetDetail }) {
  const { wide, extraWide } = useBreakpoint();
  const { version: asked } = useLocalSearchParams<{ version?: string }>();
  const versions = [...set.versions].sort((a, b) => b.number - a.number);
  const open = versions.find((version) => String(version.number) === asked) ?? versions[0];
  if (!open) return null; // a set always has its first version
  const line = [
    set.vehicleName,
    `${set.versionCount} ${set.versionCount === 1 ? 'version' : 'versions'}`,
    `begun by ${set.createdBy}`,
  ]
    .filter(Boolean)
    .join(' · ');
  return (
    <Screen
      title={set.name}
      subtitle={<Figures tone="soft">{line}</Figures>}
      back={wide ? undefined : '/sets'}
      actions={versions.length > 1 ? <CompareVersions set={set} versions={versions} open={open} /> : null}
    >
      <View style={extraWide ? styles.columns : styles.stack}>
        <View style={extraWide ? styles.side : null}>
          <VersionList
            versions={versions}
            current={open.number}
            onChoose={(number) => router.setParams({ version: String(number) })}
          />
        </View>
        <View style={extraWide ? styles.main : styles.stack}>
          <VersionCard key={open.id} set={set} version={open} />
        </View>
      </View>
    </Screen>
  );
}

/** The open version beside the one it came from, on a recording of choice. */
function CompareVersions({
  set,
  versions,
  open,
}: {
  set: ParameterSetDetail;
  versions: ParameterSetVersion[];
  open: ParameterSetVersion;
}) {
  const [picking, setPicking] = useState(false);
  const { wide } = useBreakpoint();
  const other =
    versions.find(({ number }) => number === open.parentNumber) ??
    versions.find(({ number }) => number !== open.number);
  if (!other) return null;
  const entries = [other, open].map(({ number }) => ({ set: set.id, version: number }));
  return (
    <>
      <Button label="Compare" icon="compare" iconOnly={!wide} onPress={() => setPicking(true)} />
      {picking ? (
        <RecordingPicker
          title={`Versions ${other.number} and ${open.number} on which recording?`}
          onPick={({ id }) => router.push(hrefOf(compareHref({ recordingId: id, entries })))}
          onClose={() => setPicking(false)}
        />
      ) : null}
    </>
  );
}

const styles = StyleSheet.create({
  columns: { flexDirection: 'row', gap: space.l, alignItems: 'flex-start' },
  stack: { gap: space.l },
  side: { width: 250, flexShrink: 0 },
  main: { flex: 1, minWidth: 0, gap: space.l },
});
