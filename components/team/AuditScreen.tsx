import { StyleSheet, View } from 'react-native';
import { useState } from 'react';
import { Screen } from '@/components/layout/Screen';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { EmptyState } from '@/components/ui/EmptyState';
import { ErrorState } from '@/components/ui/ErrorState';
import { Field } from '@/components/ui/Field';
import { FileLink } from '@/components/ui/FileLink';
import { NoPermission } from '@/components/ui/NoPermission';
import { SkeletonList } from '@/components/ui/Skeleton';
import { space } from '@/constants/theme';
import { auditCsvUrl, useAudit } from '@/hooks/audit';
import { useCan, useSession } from '@/hooks/session';
import { useMembers } from '@/hooks/team';
import { useDebounced } from '@/hooks/use-debounced';
import { actionWords, AUDIT_ACTIONS } from '@/shared/audit-words';
import type { AuditFilter } from '@/shared/contracts/accounts';
import { AuditRow } from './AuditRow';

/** Who changed what, when, from where: to be narrowed and taken away, changed by nobody. */
export function AuditScreen() {
  const { wide } = useBreakpoint();
  const { workspace } = useSession();
  const mayRead = useCan('audit:read');
  return (
    <Screen title="Audit trail" subtitle={workspace.name} back={wide ? undefined : '/more'} width="page">
      {mayRead ? <Trail /> : <NoPermission message="Only an admin reads the audit trail." />}
    </Screen>
  );
}

const ALL = '';

function Trail() {
  const [search, setSearch] = useState('');
  const [action, setAction] = useState(ALL);
  const [actorId, setActorId] = useState(ALL);
  const members = useMembers();
  const words = useDebounced(search.trim(), 300);
  const filter: AuditFilter = {
    search: words || undefined,
    action: action || undefined,
    actorId: actorId || undefined,
  };
  const audit = useAudit(filter);
  const entries = audit.data?.pages.flatMap(({ items }) => items) ?? [];
  return (
    <>
      <View style={styles.filters}>
        <View style={styles.filter}>
          <Field label="Search" icon="search" value={search} onChangeText={setSearch} />
        </View>
        <View style={styles.filter}>
          <Choice
            label="What was done"
            shape="select"
            placeholder="anything"
            value={action}
            options={[
              { value: ALL, label: 'anything' },
              ...AUDIT_ACTIONS.map((one) => ({ value: one, label: actionWords(one) })),
            ]}
            onChange={setAction}
          />
        </View>
        <View style={styles.filter}>
          <Choice
            label="By whom"
            shape="select"
            placeholder="anybody"
            value={actorId}
            options={[
              { value: ALL, label: 'anybody' },
              ...(members.data ?? []).map(({ userId, name }) => ({ value: userId, label: name })),
            ]}
            onChange={setActorId}
          />
        </View>
        <FileLink href={auditCsvUrl(filter)} label="CSV" of="Audit trail" />
      </View>
      {audit.isPending ? <SkeletonList label="the audit trail" rows={5} /> : null}
      {audit.isError ? (
        <ErrorState
          title="The audit trail could not be loaded"
          error={audit.error}
          onRetry={() => void audit.refetch()}
        />
      ) : null}
      {audit.isSuccess && entries.length === 0 ? (
        <EmptyState
          title="Nothing of the kind"
          message="Nothing was done that all of these words fit."
          icon="search"
        />
      ) : null}
      <View role="list" aria-label="Changes">
        {entries.map((entry) => (
          <AuditRow key={entry.id} entry={entry} />
        ))}
      </View>
      {audit.hasNextPage ? (
        <View style={styles.more}>
          <Button
            label="Earlier"
            icon="down"
            busy={audit.isFetchingNextPage}
            onPress={() => void audit.fetchNextPage()}
          />
        </View>
      ) : null}
    </>
  );
}

const styles = StyleSheet.create({
  filters: { flexDirection: 'row', flexWrap: 'wrap', alignItems: 'flex-end', gap: space.m },
  filter: { flexGrow: 1, flexBasis: 180, minWidth: 0 },
  more: { flexDirection: 'row' },
});
