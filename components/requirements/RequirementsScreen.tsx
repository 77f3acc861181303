import { router } from 'expo-router';
import { StyleSheet, View } from 'react-native';
import { requirementPath } from '@/components/layout/paths';
import { Screen } from '@/components/layout/Screen';
import { Button } from '@/components/ui/Button';
import { CardLink } from '@/components/ui/CardLink';
import { EmptyState } from '@/components/ui/EmptyState';
import { ErrorState } from '@/components/ui/ErrorState';
import { Figures } from '@/components/ui/Figures';
import { SkeletonList } from '@/components/ui/Skeleton';
import { Text } from '@/components/ui/Text';
import { space } from '@/constants/theme';
import { useRequirements } from '@/hooks/requirements';
import { useCan } from '@/hooks/session';
import type { Requirement } from '@/shared/contracts/requirements';
import { scheduleWords } from '@/shared/requirements/metric-words';

/** What the vehicles' sets must show before one is released. */
export function RequirementsScreen() {
  const requirements = useRequirements();
  const mayWrite = useCan('requirement:write');
  const add = mayWrite ? (
    <Button
      label="Add a requirement"
      kind="primary"
      icon="plus"
      onPress={() => router.push('/requirements/new')}
    />
  ) : null;
  return (
    <Screen title="Requirements" actions={requirements.data?.length ? add : undefined} width="page">
      {requirements.isPending ? <SkeletonList label="requirements" rows={3} /> : null}
      {requirements.isError ? (
        <ErrorState
          title="The requirements could not be loaded"
          error={requirements.error}
          onRetry={() => void requirements.refetch()}
        />
      ) : null}
      {requirements.data?.length === 0 ? (
        <EmptyState
          title="Nothing is required yet"
          message="A requirement is a limit on a metric, such as: horizontal drift after 60 s without GNSS, 95th percentile, at most 15 m. Each version of a set is verified against those of its vehicle before it is released."
          icon="check"
          actions={add ?? <Text tone="soft">An engineer adds the first one.</Text>}
        />
      ) : null}
      <View style={styles.list}>
        {requirements.data?.map((requirement) => (
          <Row key={requirement.id} requirement={requirement} />
        ))}
      </View>
    </Screen>
  );
}

function Row({ requirement }: { requirement: Requirement }) {
  const { name, sentence, vehicleName, recordings, schedule } = requirement;
  const count = recordings.length === 1 ? '1 recording' : `${recordings.length} recordings`;
  const line = [vehicleName ?? 'every vehicle', count, scheduleWords(schedule)].join(' · ');
  return (
    <CardLink href={requirementPath(requirement.id)} label={`${name}, ${sentence}, ${line}`}>
      <Text strong>{name}</Text>
      <Figures variant="body">{sentence}</Figures>
      <Figures tone="soft">{line}</Figures>
    </CardLink>
  );
}

const styles = StyleSheet.create({ list: { gap: space.m } });
