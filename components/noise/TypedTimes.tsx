import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import type { Stretch } from '@/components/strip/stretches';
import { parseClock } from '@/components/strip/window-model';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { space } from '@/constants/theme';
import type { Recording } from '@/shared/contracts/recordings';
import { formatNumber } from '@/shared/format';

export interface TypedTimesProps {
  recording: Pick<Recording, 'startS' | 'endS'>;
  /** What the fields start from. */
  shown: Stretch | null;
  onChoose: (stretch: Stretch) => void;
}

/** A stretch by its two times, to the millisecond. */
export function TypedTimes({ recording, shown, onChoose }: TypedTimesProps) {
  const [from, setFrom] = useState(shown ? String(round(shown[0])) : '');
  const [to, setTo] = useState(shown ? String(round(shown[1])) : '');
  const [problem, setProblem] = useState<string>();
  const submit = () => {
    const [fromS, toS] = [parseClock(from), parseClock(to)];
    const [startS, endS] = [recording.startS ?? 0, recording.endS ?? 0];
    if (!(toS > fromS))
      return setProblem('Write two times in seconds or as min:s, the second after the first.');
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

const round = (value: number) => Math.round(value * 1000) / 1000;

const styles = StyleSheet.create({
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
