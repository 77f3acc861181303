import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { Card } from '@/components/ui/Card';
import { messageOf } from '@/components/ui/ErrorState';
import { Figures } from '@/components/ui/Figures';
import { Icon } from '@/components/ui/Icon';
import { Notice } from '@/components/ui/Notice';
import { Text } from '@/components/ui/Text';
import { space } from '@/constants/theme';
import type { useMapPreview } from '@/hooks/recordings';
import type { MapPreview } from '@/shared/contracts/recordings';
import { MiniPlot } from './MiniPlot';
import { gravityCheck, openFindings, turnCheck, type Check } from './preview-checks';
import { PreviewFindings, PreviewProblems, type TakeMap } from './PreviewFindings';

export interface PreviewPaneProps {
  state: ReturnType<typeof useMapPreview>;
  /** The form lacks something that must be said before anything can be shown anew. */
  incomplete: boolean;
  onTake: TakeMap;
}

/** What the map in the form makes of the first rows. An older picture stays until the next one is there. */
export function PreviewPane({ state, incomplete, onTake }: PreviewPaneProps) {
  const { preview, computing, error } = state;
  return (
    <Card
      role="region"
      aria-label="Preview"
      title="What this map makes of the first rows"
      action={
        <Text variant="small" tone="soft" role="status">
          {signOf(computing && !incomplete, incomplete)}
        </Text>
      }
    >
      {error ? (
        <Notice tone="ochre" title="No new preview">
          {messageOf(error)}
        </Notice>
      ) : null}
      {preview ? (
        <Shown preview={preview} onTake={onTake} />
      ) : (
        <Text variant="label" tone="soft">
          {incomplete
            ? 'Choose the columns that are still missing: six plots, gravity and the turns then show whether they are right.'
            : 'The first rows are being read.'}
        </Text>
      )}
    </Card>
  );
}

const signOf = (computing: boolean, incomplete: boolean) =>
  incomplete ? 'waits for the form' : computing ? 'computing …' : 'up to date';

function Shown({ preview, onTake }: { preview: MapPreview; onTake: TakeMap }) {
  return (
    <View style={styles.stack}>
      <View style={styles.checks}>
        <CheckLine name="Gravity" check={gravityCheck(preview)} />
        <CheckLine name="Turns" check={turnCheck(preview)} />
      </View>
      <PreviewProblems problems={preview.problems} />
      <PreviewFindings findings={openFindings(preview)} onTake={onTake} />
      {preview.series ? <Plots preview={preview} /> : null}
    </View>
  );
}

function CheckLine({ name, check }: { name: string; check: Check | null }) {
  if (!check) return null;
  return (
    <View style={styles.check}>
      <Icon name={ICONS[check.tone]} tone={check.tone} size={20} />
      <Figures style={styles.words}>{`${name}: ${check.words}`}</Figures>
    </View>
  );
}

const ICONS = { pine: 'check', ochre: 'warn', vermilion: 'stop', soft: 'info' } as const;

function Plots({ preview }: { preview: MapPreview }) {
  const [width, setWidth] = useState(0);
  const each = Math.floor((width - space.l) / 2);
  const channelOf = (name: string) => preview.series?.channels.find((channel) => channel.name === name);
  return (
    <View style={styles.plots} onLayout={(event) => setWidth(Math.floor(event.nativeEvent.layout.width))}>
      {each > 0
        ? (['x', 'y', 'z'] as const).map((axis) => (
            <View key={axis} style={styles.pair}>
              <MiniPlot
                title={`Gyro ${axis}`}
                tone={TONES[axis]}
                channel={channelOf(`gyro_${axis}`)}
                width={each}
              />
              <MiniPlot
                title={`Accelerometer ${axis}`}
                tone={TONES[axis]}
                channel={channelOf(`accel_${axis}`)}
                width={each}
              />
            </View>
          ))
        : null}
      <Text variant="small" tone="soft">
        {`x forward, y right, z down, as the map and the vehicle’s axes say. ${spanWords(preview)}`}
      </Text>
    </View>
  );
}

/** The stretch that the plots cover. */
function spanWords({ series }: MapPreview): string {
  const time = series?.channels[0]?.timeS ?? [];
  const span = (time[time.length - 1] ?? 0) - (time[0] ?? 0);
  return `The first ${Math.round(span)} s.`;
}

const TONES = { x: 'north', y: 'east', z: 'down' } as const;

const styles = StyleSheet.create({
  stack: { gap: space.m },
  checks: { gap: space.xs },
  check: { flexDirection: 'row', gap: space.s, alignItems: 'flex-start' },
  words: { flex: 1 },
  plots: { gap: space.s },
  pair: { flexDirection: 'row', gap: space.l },
});
