import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { StretchStrip } from '@/components/strip/StretchStrip';
import type { Stretch } from '@/components/strip/stretches';
import { Card } from '@/components/ui/Card';
import { Choice } from '@/components/ui/Choice';
import { Figures } from '@/components/ui/Figures';
import { Text } from '@/components/ui/Text';
import { space } from '@/constants/theme';
import type { NoiseAnalysis } from '@/shared/contracts/noise';
import type { Recording } from '@/shared/contracts/recordings';
import { formatClock, formatDuration, formatNumber } from '@/shared/format';
import { TypedTimes } from './TypedTimes';

export interface StretchCardProps {
  recording: Recording;
  /** Found at rest, the longest first; null while they are looked for. */
  found: readonly Stretch[] | null;
  /** Null: the longest of those found. */
  chosen: Stretch | null;
  /** Of the chosen stretch; null while it is worked out, or where there is none. */
  analysis: NoiseAnalysis | null;
  onChoose: (stretch: Stretch) => void;
}

/** Which stretch is analysed: one of those found at rest, one drawn on the strip, or typed times. */
export function StretchCard({ recording, found: known, chosen, analysis, onChoose }: StretchCardProps) {
  const found = known ?? [];
  const [drag, setDrag] = useState<Stretch | null>(null);
  const shown = drag ?? chosen ?? found[0] ?? null;
  const at = shown ? found.findIndex((one) => isSame(one, shown)) : -1;
  return (
    <Card title="Stretch at rest">
      {recording.strip ? (
        <>
          <StretchStrip
            strip={recording.strip}
            height={96}
            found={found}
            chosen={shown}
            onChoose={(stretch, settled) => {
              setDrag(settled ? null : stretch);
              if (settled) onChoose(stretch);
            }}
          />
          <Text variant="label" tone="soft">
            {`${howTo(known)} across the strip to draw one; its edges resize it.`}
          </Text>
        </>
      ) : null}
      {analysis ? (
        <Figures tone="soft">
          {`${words([analysis.fromS, analysis.toS])} analysed, ${formatNumber(1 / analysis.intervalS)} Hz`}
        </Figures>
      ) : null}
      <View style={styles.row}>
        {found.length > 0 ? (
          <View style={styles.found}>
            <Choice
              label="Found at rest"
              shape="select"
              placeholder={at < 0 ? 'Drawn or typed' : undefined}
              value={at < 0 ? '' : String(at)}
              options={found.map((one, i) => ({ value: String(i), label: words(one) }))}
              onChange={(value) => {
                const one = found[Number(value)];
                if (one) onChoose(one);
              }}
            />
          </View>
        ) : null}
        <TypedTimes key={String(shown)} recording={recording} shown={shown} onChoose={onChoose} />
      </View>
    </Card>
  );
}

const howTo = (found: readonly Stretch[] | null) => {
  if (found === null) return 'Stretches at rest are being looked for. Or drag';
  return found.length > 0 ? 'Tap a green stretch, found at rest, or drag' : 'Nothing was found at rest. Drag';
};
const words = ([from, to]: Stretch) =>
  `${formatClock(from)}–${formatClock(to)} (${formatDuration(to - from)})`;
const isSame = (a: Stretch, b: Stretch) => a[0] === b[0] && a[1] === b[1];

const styles = StyleSheet.create({
  row: { flexDirection: 'row', flexWrap: 'wrap', gap: space.l, alignItems: 'flex-end' },
  found: { flexGrow: 1, flexBasis: 240, minWidth: 0 },
});
