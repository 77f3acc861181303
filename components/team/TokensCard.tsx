import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { ConfirmDialog } from '@/components/ui/Dialog';
import { ErrorState, messageOf } from '@/components/ui/ErrorState';
import { Figures } from '@/components/ui/Figures';
import { formatDay, formatMoment } from '@/components/ui/format-day';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { useToast } from '@/components/ui/ToastProvider';
import { hairline, space } from '@/constants/theme';
import { useRevokeToken, useTokens } from '@/hooks/tokens';
import type { Token } from '@/shared/contracts/tokens';
import { NewTokenDialog } from './NewTokenDialog';
import { SCOPE_LABELS } from './scope-words';

/** Tokens by which builds and loggers reach the API; each is shown once, when it is made. */
export function TokensCard() {
  const tokens = useTokens();
  const [making, setMaking] = useState(false);
  return (
    <Card
      title="API tokens"
      action={<Button label="New token" icon="plus" onPress={() => setMaking(true)} />}
    >
      {tokens.isError ? (
        <ErrorState
          title="The tokens could not be loaded"
          error={tokens.error}
          onRetry={() => void tokens.refetch()}
        />
      ) : null}
      {tokens.data?.length === 0 ? (
        <Text variant="label" tone="soft">
          None yet. A build fetches the released set of a vehicle with one.
        </Text>
      ) : null}
      {tokens.data?.map((token) => (
        <Row key={token.id} token={token} />
      ))}
      {making ? <NewTokenDialog onClose={() => setMaking(false)} /> : null}
    </Card>
  );
}

function Row({ token }: { token: Token }) {
  const { palette } = useTheme();
  const [asking, setAsking] = useState(false);
  const revoke = useRevokeToken();
  const toast = useToast();
  const confirm = async () => {
    try {
      await revoke.mutateAsync(token.id);
      setAsking(false);
      toast({ message: `${token.name} is revoked; it opens nothing any more.` });
    } catch (error) {
      toast({ message: messageOf(error), tone: 'vermilion' });
    }
  };
  const { name, prefix, scopes, state, createdBy, createdAt, expiresAt, lastUsedAt, lastUsedFrom } = token;
  const used = lastUsedAt
    ? `last used ${formatMoment(lastUsedAt)}${lastUsedFrom ? ` from ${lastUsedFrom}` : ''}`
    : 'never used';
  const until = expiresAt ? `until ${formatDay(expiresAt)}` : 'without end';
  return (
    <View style={[styles.row, { borderTopColor: palette.rule }]}>
      <View style={styles.words}>
        <Text strong>{name}</Text>
        <Text variant="label">{scopes.map((scope) => SCOPE_LABELS[scope]).join(', ')}</Text>
        <Figures tone="soft">{`${prefix}… · by ${createdBy}, ${formatDay(createdAt)} · ${until} · ${used}`}</Figures>
      </View>
      {state === 'active' ? (
        <Button label="Revoke" kind="danger" onPress={() => setAsking(true)} />
      ) : (
        <Text variant="label" strong tone="soft">
          {state}
        </Text>
      )}
      <ConfirmDialog
        open={asking}
        danger
        title={`Revoke ${name}?`}
        message="Whatever uses it is refused from now on. It cannot be given back: make a new one instead."
        confirmLabel="Revoke the token"
        busy={revoke.isPending}
        onConfirm={() => void confirm()}
        onClose={() => setAsking(false)}
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
    paddingTop: space.m,
  },
  words: { flexGrow: 1, flexShrink: 1, flexBasis: 220, minWidth: 0 },
});
