import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { parseNumber } from '@/components/forms/parse-number';
import { StripBox } from '@/components/recordings/StripBox';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { Choice } from '@/components/ui/Choice';
import { Field } from '@/components/ui/Field';
import { Figures } from '@/components/ui/Figures';
import { space } from '@/constants/theme';
import type { NoiseAnalysis } from '@/shared/contracts/noise';
import type { Recording } from '@/shared/contracts/recordings';
import { formatClock, formatDuration, formatNumber } from '@/shared/format';

export interface StretchCardProps {
  recording: Recording;
  analysis: NoiseAnalysis | null;
  onChoose: (spanS: readonly [number, number]) => void;
}

/** Which stretch is analysed: one of those found at rest, or typed times. */
export function StretchCard({ recording, analysis, onChoose }: StretchCardProps) {
  const stretches = analysis?.stretchesS ?? [];
  const at = analysis ? stretches.findIndex((one) => isSame(one, analysis)) : -1;
  return (
    <Card title="Stretch at rest">
      {recording.strip ? <StripBox strip={recording.strip} height={88} /> : null}
      {analysis ? (
        <Figures tone="soft">
          {`${clock(analysis.fromS)}–${clock(analysis.toS)}: ${formatDuration(analysis.toS - analysis.fromS)}, ${formatNumber(1 / analysis.intervalS)} Hz`}
        </Figures>
      ) : null}
      <View style={styles.row}>
        {stretches.length > 0 ? (
          <View style={styles.found}>
            <Choice
              label="Found at rest"
              shape="select"
              placeholder={at < 0 ? 'Typed times' : undefined}
              value={at < 0 ? '' : String(at)}
              options={stretches.map((one, i) => ({ value: String(i), label: words(one) }))}
              onChange={(value) => {
                const chosen = stretches[Number(value)];
                if (chosen) onChoose(chosen);
              }}
            />
          </View>
        ) : null}
        <TypedTimes
          key={analysis ? `${analysis.fromS}` : ''}
          recording={recording}
          analysis={analysis}
          onChoose={onChoose}
        />
      </View>
    </Card>
  );
}

function TypedTimes({ recording, analysis, onChoose }: StretchCardProps) {
  const [from, setFrom] = useState(analysis ? String(round(analysis.fromS)) : '');
  const [to, setTo] = useState(analysis ? String(round(analysis.toS)) : '');
  const [problem, setProblem] = useState<string>();
  const submit = () => {
    const [fromS, toS] = [parseNumber(from), parseNumber(to)];
    const [startS, endS] = [recording.startS ?? 0, recording.endS ?? 0];
    if (fromS === undefined || toS === undefined || !(toS > fromS))
      return setProblem('Write two times in seconds, the second after the first.');
    if (toS <= startS || fromS >= endS)
      return setProblem(`The recording goes from ${formatNumber(startS, 6)} to ${formatNumber(endS, 6)} s.`);
    setProblem(undefined);
    onChoose([fromS, toS]);
  };
  return (
    <View style={styles.times}>
      <View style={styles.time}>
        <Field label="From" unit="s" numeric value={from} onChangeText={setFrom} error={problem} />
      </View>
      <View style={styles.time}>
        <Field label="To" unit="s" numeric value={to} onChangeText={setTo} onSubmitEditing={submit} />
      </View>
      <Button label="Analyse" onPress={submit} />
    </View>
  );
}

const clock = (timeS: number) => formatClock(timeS);
const round = (value: number) => Math.round(value * 1000) / 1000;
const words = ([from, to]: readonly [number, number]) =>
  `${clock(from)}–${clock(to)} (${formatDuration(to - from)})`;
/** A stretch with a gap is analysed in part. */
const isSame = ([from, to]: readonly [number, number], { fromS, toS }: NoiseAnalysis) =>
  fromS >= from && toS <= to;

const styles = StyleSheet.create({
  row: { flexDirection: 'row', flexWrap: 'wrap', gap: space.l, alignItems: 'flex-end' },
  found: { flexGrow: 1, flexBasis: 240, minWidth: 0 },
  times: {
    flexDirection: 'row',
    flexWrap: 'wrap',
    gap: space.m,
    alignItems: 'flex-end',
    flexGrow: 1,
    flexBasis: 300,
  },
  time: { flexGrow: 1, flexBasis: 96, minWidth: 0 },
});
