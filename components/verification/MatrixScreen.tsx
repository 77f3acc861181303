import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { versionPath } from '@/components/layout/paths';
import { Screen } from '@/components/layout/Screen';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { EmptyState } from '@/components/ui/EmptyState';
import { ErrorState } from '@/components/ui/ErrorState';
import { Figures } from '@/components/ui/Figures';
import { Notice } from '@/components/ui/Notice';
import { Progress } from '@/components/ui/Progress';
import { SkeletonList } from '@/components/ui/Skeleton';
import { TextLink } from '@/components/ui/TextLink';
import { space } from '@/constants/theme';
import { useParameterSet } from '@/hooks/parameter-sets';
import { useVerification } from '@/hooks/verification';
import type { VersionRef } from '@/hooks/versions';
import type { ParameterSetDetail } from '@/shared/contracts/parameter-sets';
import type { Verification, VerificationCell } from '@/shared/contracts/verification';
import { countWords } from './cell-words';
import { CellSheet } from './CellSheet';
import { MatrixCards } from './MatrixCards';
import { MatrixTable } from './MatrixTable';
import { VerifyButton } from './VerifyButton';

/** Requirements × recordings of one version: what passes, what fails, and the run behind each cell. */
export function MatrixScreen({ of }: { of: VersionRef }) {
  const set = useParameterSet(of.setId);
  const verification = useVerification(of);
  const failed = [set, verification].find(({ isError }) => isError);
  const back = versionPath(of.setId, of.number);
  if (failed)
    return (
      <Screen title="Verification" back={back}>
        <ErrorState
          title="The verification cannot be shown"
          error={failed.error}
          onRetry={() => void failed.refetch()}
        />
      </Screen>
    );
  if (!set.data || !verification.data)
    return (
      <Screen title="Verification" back={back}>
        <SkeletonList label="the verification" rows={3} />
      </Screen>
    );
  return <Loaded of={of} set={set.data} verification={verification.data} />;
}

interface LoadedProps {
  of: VersionRef;
  set: ParameterSetDetail;
  verification: Verification;
}

function Loaded({ of, set, verification }: LoadedProps) {
  const { wide } = useBreakpoint();
  const [open, setOpen] = useState<string | null>(null);
  const version = set.versions.find(({ number }) => number === of.number);
  const chosen = verification.cells.find((cell) => cellKey(cell) === open) ?? null;
  const Body = wide ? MatrixTable : MatrixCards;
  return (
    <Screen
      title={`${set.name} v${of.number}: verification`}
      subtitle={
        <Figures tone="soft">
          {[set.vehicleName, countWords(verification.counts)].filter(Boolean).join(' · ')}
        </Figures>
      }
      back={versionPath(of.setId, of.number)}
      actions={<VerifyButton of={of} verification={verification} />}
    >
      {verification.state === 'going' ? <Progress label="Verifying" value={verification.progress} /> : null}
      {verification.evidence ? (
        <Notice tone="petrol" title="Released with this evidence">
          {verification.evidence.withoutRequirements
            ? `Released without requirements: ${verification.evidence.withoutRequirements}`
            : `The matrix as it stood at the release is kept with the version, for engine ${verification.evidence.engineVersion}.`}
        </Notice>
      ) : null}
      {verification.requirements.length === 0 ? (
        <EmptyState
          title={
            set.vehicleName ? `Nothing is required of ${set.vehicleName} yet` : 'The set has no vehicle yet'
          }
          message={
            set.vehicleName
              ? 'A requirement is a limit on a metric, such as the horizontal drift after 60 s without GNSS, judged on recordings.'
              : 'Requirements belong to a vehicle: choose the vehicle on the page of the set.'
          }
          icon="check"
          actions={<TextLink href="/requirements" label="Requirements" />}
        />
      ) : (
        <View style={styles.body}>
          <Body verification={verification} onOpen={(cell) => setOpen(cellKey(cell))} />
        </View>
      )}
      {chosen ? (
        <CellSheet
          of={of}
          cell={chosen}
          verification={verification}
          inReview={version?.state === 'in-review'}
          authorId={version?.createdById ?? ''}
          onClose={() => setOpen(null)}
        />
      ) : null}
    </Screen>
  );
}

const cellKey = ({ requirementId, recordingId }: VerificationCell) => `${requirementId} ${recordingId}`;

const styles = StyleSheet.create({ body: { gap: space.l } });
