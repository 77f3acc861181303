import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { messageOf } from '@/components/ui/ErrorState';
import { Figures } from '@/components/ui/Figures';
import { useToast } from '@/components/ui/ToastProvider';
import { formatDay } from '@/components/ui/format-day';
import { space } from '@/constants/theme';
import { isUnderWay, useRemedy } from '@/hooks/recordings';
import { useCan } from '@/hooks/session';
import type { Recording } from '@/shared/contracts/recordings';
import { HealthCard, type HealthCardProps } from './HealthCard';
import { ProblemsCard, type ProblemsCardProps } from './ProblemsCard';

/** The health report with its remedies, for those who may accept them. */
export function Health({
  recording,
  ...rest
}: { recording: Recording } & Pick<HealthCardProps, 'health' | 'onShow'>) {
  const mayWrite = useCan('recording:write');
  const { accept, accepting } = useAccept(recording.id);
  const open = mayWrite && !isUnderWay(recording);
  return <HealthCard {...rest} onFix={open ? (code) => void accept(code) : undefined} fixing={accepting} />;
}

/** What stopped the intake, with the remedies that can be accepted. */
export function Problems({
  recording,
  ...rest
}: { recording: Recording } & Omit<ProblemsCardProps, 'problems'>) {
  const mayWrite = useCan('recording:write');
  const { accept, accepting } = useAccept(recording.id);
  return (
    <ProblemsCard
      {...rest}
      problems={recording.problems}
      onFix={mayWrite ? (code) => void accept(code) : undefined}
      fixing={accepting}
    />
  );
}

function useAccept(id: string) {
  const remedy = useRemedy(id);
  const toast = useToast();
  const accept = async (code: string) => {
    try {
      await remedy.mutateAsync(code);
      toast({ message: 'Accepted: the recording is decoded again.' });
    } catch (error) {
      toast({ message: `Not accepted: ${messageOf(error)}` });
    }
  };
  return { accept, accepting: remedy.isPending ? remedy.variables : null };
}

/** Which remedies were accepted, and the way back; nothing where there are none. */
export function RemediesCard({ recording }: { recording: Recording }) {
  const mayWrite = useCan('recording:write');
  const remedy = useRemedy(recording.id);
  const toast = useToast();
  const latest = recording.remedies.at(-1);
  if (!latest) return null;
  const undo = async () => {
    try {
      await remedy.mutateAsync(null);
      toast({ message: `Taken back: ${latest.label}.` });
    } catch (error) {
      toast({ message: `Not taken back: ${messageOf(error)}` });
    }
  };
  return (
    <Card title="Remedies in force">
      {recording.remedies.map(({ code, label, at, by }) => (
        <Figures key={`${code}-${at}`}>{`${label}, accepted by ${by}, ${formatDay(at)}`}</Figures>
      ))}
      {mayWrite && !isUnderWay(recording) ? (
        <View style={styles.row}>
          <Button
            label={recording.remedies.length > 1 ? 'Take the latest back' : 'Take it back'}
            icon="undo"
            busy={remedy.isPending}
            onPress={() => void undo()}
          />
        </View>
      ) : null}
    </Card>
  );
}

const styles = StyleSheet.create({ row: { flexDirection: 'row', gap: space.s } });
