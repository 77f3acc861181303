import { space } from '@/constants/theme';
import { View } from 'react-native';
import { Screen } from '@/components/layout/Screen';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { Choice } from '@/components/ui/Choice';
import { Facts } from '@/components/ui/Facts';
import { Text } from '@/components/ui/Text';
import { useTheme, type ThemeChoice } from '@/components/ui/ThemeProvider';
import { useSession, useSignOut } from '@/hooks/session';
import { ROLE_SUMMARY } from '@/shared/contracts/roles';
import { MailChoices } from './MailChoices';
import { LeaveButton, SessionsCard } from './SessionsCard';
import { UnitsCard } from './UnitsCard';

const THEMES: { value: ThemeChoice; label: string }[] = [
  { value: 'system', label: 'As the device' },
  { value: 'paper', label: 'Paper' },
  { value: 'night', label: 'Night' },
];

/** Who I am here, how it looks, and the way out. */
export function ProfileScreen() {
  const { wide } = useBreakpoint();
  const { user, workspace, workspaces, switchWorkspace } = useSession();
  const { choice, setChoice } = useTheme();
  const signOut = useSignOut();
  return (
    <Screen title="Profile" back={wide ? undefined : '/more'} width="text">
      <Card title={user.name}>
        <Facts
          facts={[
            { label: 'E-mail', value: <Text variant="label">{user.email}</Text> },
            { label: 'Workspace', value: <Text variant="label">{workspace.name}</Text> },
            {
              label: 'Role',
              value: <Text variant="label">{`${workspace.role}. ${ROLE_SUMMARY[workspace.role]}`}</Text>,
            },
          ]}
        />
      </Card>
      {workspaces.length > 1 ? (
        <Card title="Workspace">
          <Choice
            label="Work in"
            options={workspaces.map(({ id, name, role }) => ({ value: id, label: `${name} (${role})` }))}
            value={workspace.id}
            onChange={switchWorkspace}
            hint="Nothing crosses from one workspace to another."
          />
        </Card>
      ) : null}
      <Card title="Look">
        <Choice label="Theme" shape="segments" options={THEMES} value={choice} onChange={setChoice} />
      </Card>
      <UnitsCard />
      <MailChoices />
      <SessionsCard />
      <View style={{ flexDirection: 'row', flexWrap: 'wrap', gap: space.m }}>
        <Button label="Sign out" icon="leave" busy={signOut.isPending} onPress={() => signOut.mutate()} />
        <LeaveButton />
      </View>
    </Screen>
  );
}
