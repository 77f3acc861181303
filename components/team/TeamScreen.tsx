import { Screen } from '@/components/layout/Screen';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { NoPermission } from '@/components/ui/NoPermission';
import { useCan, useSession } from '@/hooks/session';
import { InvitationsCard } from './InvitationsCard';
import { MembersCard } from './MembersCard';
import { TokensCard } from './TokensCard';
import { WorkspaceCard } from './WorkspaceCard';

/** Who belongs to the workspace, with which role, and who is invited. */
export function TeamScreen() {
  const { wide } = useBreakpoint();
  const { workspace } = useSession();
  const mayManage = useCan('team:manage');
  return (
    <Screen title="Team" subtitle={workspace.name} back={wide ? undefined : '/more'} width="text">
      {mayManage ? (
        <>
          <MembersCard />
          <InvitationsCard />
          <TokensCard />
          <WorkspaceCard />
        </>
      ) : (
        <NoPermission message="Only an admin manages members, roles and invitations." />
      )}
    </Screen>
  );
}
