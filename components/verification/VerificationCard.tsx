import { StyleSheet, View } from 'react-native';
import { verificationPath } from '@/components/layout/paths';
import { Card } from '@/components/ui/Card';
import { ErrorState } from '@/components/ui/ErrorState';
import { Figures } from '@/components/ui/Figures';
import { Progress } from '@/components/ui/Progress';
import { TextLink } from '@/components/ui/TextLink';
import { space } from '@/constants/theme';
import { useVerification } from '@/hooks/verification';
import type { VersionRef } from '@/hooks/versions';
import { countWords } from './cell-words';
import { VerifyButton } from './VerifyButton';

/** On a version's page: how its verification stands, and the way to the matrix. */
export function VerificationCard({ of }: { of: VersionRef }) {
  const verification = useVerification(of);
  return (
    <Card title="Verification">
      {verification.isError ? (
        <ErrorState
          title="The verification could not be loaded"
          error={verification.error}
          onRetry={() => void verification.refetch()}
        />
      ) : null}
      {verification.data ? (
        <>
          <Figures>{countWords(verification.data.counts)}</Figures>
          {verification.data.state === 'going' ? (
            <Progress label="Verifying" value={verification.data.progress} />
          ) : null}
          <View style={styles.buttons}>
            <VerifyButton of={of} verification={verification.data} />
            <TextLink
              href={verificationPath(of.setId, of.number)}
              label={verification.data.counts.cells > 0 ? 'Open the matrix' : 'What is required'}
            />
          </View>
        </>
      ) : null}
    </Card>
  );
}

const styles = StyleSheet.create({
  buttons: { flexDirection: 'row', flexWrap: 'wrap', alignItems: 'center', gap: space.l },
});
