import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { Choice } from '@/components/ui/Choice';
import { ConfirmDialog } from '@/components/ui/Dialog';
import { ErrorState, messageOf } from '@/components/ui/ErrorState';
import { SkeletonList } from '@/components/ui/Skeleton';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { useToast } from '@/components/ui/ToastProvider';
import { hairline, space } from '@/constants/theme';
import { useSession } from '@/hooks/session';
import { useMembers, usePatchMember, useRemoveMember } from '@/hooks/team';
import type { Member } from '@/shared/contracts/accounts';
import { ROLE_SUMMARY, roleSchema, type Role } from '@/shared/contracts/roles';

export const ROLE_OPTIONS = roleSchema.options.map((role) => ({ value: role, label: role }));

/** Members with their roles; a change takes hold at once and can be taken back. */
export function MembersCard() {
  const members = useMembers();
  const [removing, setRemoving] = useState<Member | null>(null);
  if (members.isPending) return <SkeletonList label="members" rows={2} />;
  if (members.isError)
    return (
      <ErrorState
        title="The members could not be loaded"
        error={members.error}
        onRetry={() => void members.refetch()}
      />
    );
  return (
    <Card title="Members">
      {members.data.map((member, at) => (
        <MemberRow
          key={member.userId}
          member={member}
          first={at === 0}
          onRemove={() => setRemoving(member)}
        />
      ))}
      {removing ? <RemoveMember member={removing} onClose={() => setRemoving(null)} /> : null}
    </Card>
  );
}

function MemberRow({ member, first, onRemove }: { member: Member; first: boolean; onRemove: () => void }) {
  const { palette } = useTheme();
  const { user } = useSession();
  const patch = usePatchMember();
  const toast = useToast();
  const me = member.userId === user.id;
  const change = async (role: Role) => {
    const before = member.role;
    try {
      await patch.mutateAsync({ userId: member.userId, role });
      toast({
        message: `${member.name} is now ${role}.`,
        undo: () => patch.mutate({ userId: member.userId, role: before }),
      });
    } catch (error) {
      toast({ message: messageOf(error), tone: 'vermilion' });
    }
  };
  return (
    <View style={[styles.row, first ? null : { borderTopWidth: hairline, borderTopColor: palette.rule }]}>
      <View style={styles.words}>
        <Text strong>
          {member.name}
          {me ? (
            <Text variant="label" tone="soft">
              {'  you'}
            </Text>
          ) : null}
        </Text>
        <Text variant="label" tone="soft">
          {member.email}
        </Text>
        <Text variant="label" tone="soft">
          {ROLE_SUMMARY[member.role]}
        </Text>
      </View>
      <View style={styles.role}>
        <Choice
          label={`Role of ${member.name}`}
          labelHidden
          options={ROLE_OPTIONS}
          value={member.role}
          onChange={(role) => void change(role)}
          disabled={me || patch.isPending}
        />
        {me ? (
          <Text variant="small" tone="soft">
            Another admin changes yours.
          </Text>
        ) : null}
      </View>
      {me ? null : (
        <Button label={`Remove ${member.name}`} icon="close" iconOnly kind="plain" onPress={onRemove} />
      )}
    </View>
  );
}

function RemoveMember({ member, onClose }: { member: Member; onClose: () => void }) {
  const remove = useRemoveMember();
  const toast = useToast();
  const confirm = async () => {
    try {
      await remove.mutateAsync(member.userId);
      toast({ message: `${member.name} is out of the workspace.` });
      onClose();
    } catch (error) {
      toast({ message: messageOf(error), tone: 'vermilion' });
    }
  };
  return (
    <ConfirmDialog
      open
      danger
      title={`Remove ${member.name}?`}
      message={`${member.name} can no longer open this workspace. What they uploaded and drafted stays, under their name.`}
      confirmLabel="Remove"
      busy={remove.isPending}
      onConfirm={() => void confirm()}
      onClose={onClose}
    />
  );
}

const styles = StyleSheet.create({
  row: { flexDirection: 'row', flexWrap: 'wrap', alignItems: 'center', gap: space.m, paddingTop: space.m },
  words: { flexGrow: 1, flexShrink: 1, flexBasis: 220, minWidth: 0 },
  role: { width: 150, gap: space.xs },
});
