import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { ErrorState, messageOf } from '@/components/ui/ErrorState';
import { Figures } from '@/components/ui/Figures';
import { formatMoment } from '@/components/ui/format-day';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { useToast } from '@/components/ui/ToastProvider';
import { hairline, space } from '@/constants/theme';
import { useMailQueue, useRetryMail } from '@/hooks/mail-queue';
import type { QueuedLetter } from '@/shared/contracts/accounts';

/** Letters that have not left yet: to whom, why, and when they are tried again. */
export function MailQueue() {
  const queue = useMailQueue();
  const retry = useRetryMail();
  const toast = useToast();
  const tryAgain = async (id: string | null) => {
    try {
      await retry.mutateAsync(id);
      toast({ message: 'Tried again now; what comes of it is shown here.' });
    } catch (error) {
      toast({ message: messageOf(error), tone: 'vermilion' });
    }
  };
  const letters = queue.data ?? [];
  const isBusy = (id: string | null) => retry.isPending && retry.variables === id;
  const all = <Button label="Try all again now" busy={isBusy(null)} onPress={() => void tryAgain(null)} />;
  return (
    <Card title="Waiting to be sent" {...(letters.length > 1 ? { action: all } : {})}>
      {queue.isError ? (
        <ErrorState
          title="The waiting letters could not be loaded"
          error={queue.error}
          onRetry={() => void queue.refetch()}
        />
      ) : null}
      {queue.data?.length === 0 ? (
        <Text variant="label" tone="soft">
          No letter waits: all that were written have been sent.
        </Text>
      ) : null}
      {letters.map((letter) => (
        <Row
          key={letter.id}
          letter={letter}
          busy={isBusy(letter.id)}
          onRetry={() => void tryAgain(letter.id)}
        />
      ))}
    </Card>
  );
}

function Row({ letter, busy, onRetry }: { letter: QueuedLetter; busy: boolean; onRetry: () => void }) {
  const { palette } = useTheme();
  const { to, subject, attempts, lastError, nextTryAt } = letter;
  const tries = `${attempts} ${attempts === 1 ? 'try' : 'tries'}`;
  const next = nextTryAt ? `next try ${formatMoment(nextTryAt)}` : 'given up after three days';
  return (
    <View style={[styles.row, { borderTopColor: palette.rule }]}>
      <View style={styles.words}>
        <Text variant="label" strong>
          {subject}
        </Text>
        <Figures tone="soft">{`to ${to} · ${tries} · ${next}`}</Figures>
        {lastError ? <Text variant="small" tone="vermilion">{`Last error: ${lastError}`}</Text> : null}
      </View>
      <Button
        label="Try again now"
        aria-label={`Try again now: ${subject}, to ${to}`}
        busy={busy}
        onPress={onRetry}
      />
    </View>
  );
}

const styles = StyleSheet.create({
  row: {
    flexDirection: 'row',
    flexWrap: 'wrap',
    alignItems: 'center',
    gap: space.m,
    borderTopWidth: hairline,
    paddingVertical: space.m,
  },
  words: { flexGrow: 1, flexShrink: 1, flexBasis: 240, minWidth: 0, gap: 2 },
});
