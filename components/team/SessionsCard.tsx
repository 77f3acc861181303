import { router } from 'expo-router';
import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { ConfirmDialog } from '@/components/ui/Dialog';
import { ErrorState, messageOf } from '@/components/ui/ErrorState';
import { Figures } from '@/components/ui/Figures';
import { formatMoment } from '@/components/ui/format-day';
import { Notice } from '@/components/ui/Notice';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { useToast } from '@/components/ui/ToastProvider';
import { hairline, space } from '@/constants/theme';
import { useSession } from '@/hooks/session';
import { useEndSessions, useLeaveWorkspace, useSignedIn } from '@/hooks/workspace';
import type { SignedInSession } from '@/shared/contracts/accounts';
import { browserWords } from './browser-words';

/** Where one is signed in, and the way out of each. */
export function SessionsCard() {
  const sessions = useSignedIn();
  const end = useEndSessions();
  const toast = useToast();
  const others = sessions.data?.filter(({ current }) => !current) ?? [];
  const signOut = async (id: string | null, done: string) => {
    try {
      await end.mutateAsync(id);
      toast({ message: done });
    } catch (error) {
      toast({ message: messageOf(error), tone: 'vermilion' });
    }
  };
  return (
    <Card title="Where you are signed in">
      {sessions.isError ? (
        <ErrorState title="The sessions could not be loaded" error={sessions.error} />
      ) : null}
      {sessions.data?.map((session) => (
        <Row key={session.id} session={session} onEnd={() => void signOut(session.id, 'Signed out there.')} />
      ))}
      {others.length > 0 ? (
        <View style={styles.buttons}>
          <Button
            label="Sign out everywhere else"
            busy={end.isPending && end.variables === null}
            onPress={() => void signOut(null, 'Only this session is left.')}
          />
        </View>
      ) : null}
    </Card>
  );
}

function Row({ session, onEnd }: { session: SignedInSession; onEnd: () => void }) {
  const { palette } = useTheme();
  const { current, browser, address, seenAt } = session;
  const line = [address, seenAt ? `last seen ${formatMoment(seenAt)}` : null].filter(Boolean).join(' · ');
  return (
    <View style={[styles.row, { borderTopColor: palette.rule }]}>
      <View style={styles.words}>
        <Text strong>{`${browserWords(browser)}${current ? ', this one' : ''}`}</Text>
        <Figures tone="soft">{line}</Figures>
      </View>
      {current ? null : <Button label="Sign out there" onPress={onEnd} />}
    </View>
  );
}

/** Out of the workspace, by one's own will; what one made stays. */
export function LeaveButton() {
  const [asking, setAsking] = useState(false);
  const { workspace } = useSession();
  const leave = useLeaveWorkspace();
  const confirm = async () => {
    try {
      await leave.mutateAsync();
      router.replace('/');
    } catch {
      // shown below from the mutation's own state
    }
  };
  return (
    <>
      <Button label="Leave the workspace" kind="danger" onPress={() => setAsking(true)} />
      <ConfirmDialog
        open={asking}
        danger
        title={`Leave ${workspace.name}?`}
        message="What you uploaded, ran and drafted stays with the team under your name. API tokens that you made are revoked. You come back only by an invitation."
        confirmLabel="Leave"
        busy={leave.isPending}
        onConfirm={() => void confirm()}
        onClose={() => setAsking(false)}
      >
        {leave.isError ? (
          <Notice tone="vermilion" urgent title="You have not left">
            {messageOf(leave.error)}
          </Notice>
        ) : null}
      </ConfirmDialog>
    </>
  );
}

const styles = StyleSheet.create({
  row: {
    flexDirection: 'row',
    flexWrap: 'wrap',
    alignItems: 'center',
    gap: space.m,
    borderTopWidth: hairline,
    paddingTop: space.m,
  },
  words: { flexGrow: 1, flexShrink: 1, flexBasis: 220, minWidth: 0 },
  buttons: { flexDirection: 'row' },
});
