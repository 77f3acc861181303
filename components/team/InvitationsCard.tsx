import { zodResolver } from '@hookform/resolvers/zod';
import { useForm, useWatch } from 'react-hook-form';
import { StyleSheet, View } from 'react-native';
import { FormChoice } from '@/components/forms/FormChoice';
import { FormField } from '@/components/forms/FormField';
import { FormProblem } from '@/components/forms/FormProblem';
import { showProblem } from '@/components/forms/problem';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { ErrorState, messageOf } from '@/components/ui/ErrorState';
import { Figures } from '@/components/ui/Figures';
import { formatDay, formatMoment } from '@/components/ui/format-day';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { useToast } from '@/components/ui/ToastProvider';
import { hairline, space } from '@/constants/theme';
import { useInstallation } from '@/hooks/accounts';
import { useInvitations, useInvite, useRevokeInvitation } from '@/hooks/team';
import { invitationCreateSchema, type Invitation, type InvitationCreate } from '@/shared/contracts/accounts';
import { ROLE_SUMMARY } from '@/shared/contracts/roles';
import { ROLE_OPTIONS } from './MembersCard';

/** Invite by e-mail; open invitations can be taken back. */
export function InvitationsCard() {
  const invitations = useInvitations();
  return (
    <Card title="Invitations">
      <InviteForm />
      {invitations.isError ? (
        <ErrorState title="The open invitations could not be loaded" error={invitations.error} />
      ) : null}
      {invitations.data?.map((invitation) => (
        <Open key={invitation.id} invitation={invitation} />
      ))}
      {invitations.data?.length === 0 ? (
        <Text variant="label" tone="soft">
          No open invitations.
        </Text>
      ) : null}
    </Card>
  );
}

function InviteForm() {
  const invite = useInvite();
  const installation = useInstallation();
  const toast = useToast();
  const { control, handleSubmit, setError, formState, reset } = useForm<InvitationCreate>({
    resolver: zodResolver(invitationCreateSchema),
    defaultValues: { email: '', role: 'engineer' },
  });
  const role = useWatch({ control, name: 'role' });
  const submit = handleSubmit(async (input) => {
    try {
      await invite.mutateAsync(input);
      reset();
      const where = installation.data?.mailSink ? ' The letter is under Mail.' : '';
      toast({ message: `${input.email} is invited.${where}` });
    } catch (error) {
      showProblem(error, ['email', 'role'], setError);
    }
  });
  return (
    <View style={{ gap: space.m }}>
      <FormProblem title="Not invited" message={formState.errors.root?.message} />
      <View style={styles.form}>
        <View style={styles.email}>
          <FormField
            control={control}
            name="email"
            label="E-mail"
            inputMode="email"
            autoCapitalize="none"
            autoComplete="off"
            required
            onSubmitEditing={() => void submit()}
          />
        </View>
        <View style={styles.role}>
          <FormChoice control={control} name="role" label="Role" options={ROLE_OPTIONS} />
        </View>
      </View>
      <View style={styles.foot}>
        <Text variant="label" tone="soft" style={styles.summary}>
          {ROLE_SUMMARY[role]}
        </Text>
        <Button
          label="Invite"
          icon="mail"
          kind="primary"
          busy={formState.isSubmitting}
          onPress={() => void submit()}
        />
      </View>
    </View>
  );
}

function Open({ invitation }: { invitation: Invitation }) {
  const { palette } = useTheme();
  const revoke = useRevokeInvitation();
  const toast = useToast();
  const withdraw = async () => {
    try {
      await revoke.mutateAsync(invitation.id);
      toast({ message: `The invitation of ${invitation.email} is withdrawn; its link no longer works.` });
    } catch (error) {
      toast({ message: messageOf(error), tone: 'vermilion' });
    }
  };
  return (
    <View style={[styles.open, { borderTopColor: palette.rule }]}>
      <View style={styles.email}>
        <Text strong>{invitation.email}</Text>
        <Figures tone="soft">
          {`${invitation.role} · by ${invitation.invitedBy}, ${formatDay(invitation.createdAt)} · until ${formatMoment(invitation.expiresAt)}`}
        </Figures>
      </View>
      <Button label="Withdraw" busy={revoke.isPending} onPress={() => void withdraw()} />
    </View>
  );
}

const styles = StyleSheet.create({
  form: { flexDirection: 'row', flexWrap: 'wrap', gap: space.m, alignItems: 'flex-start' },
  email: { flexGrow: 1, flexShrink: 1, flexBasis: 220, minWidth: 0 },
  role: { width: 150 },
  foot: { flexDirection: 'row', flexWrap: 'wrap', gap: space.m, alignItems: 'center' },
  summary: { flex: 1, minWidth: 160 },
  open: {
    flexDirection: 'row',
    flexWrap: 'wrap',
    alignItems: 'center',
    gap: space.m,
    borderTopWidth: hairline,
    paddingTop: space.m,
  },
});
