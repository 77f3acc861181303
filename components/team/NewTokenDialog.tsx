import { useState } from 'react';
import { View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Dialog } from '@/components/ui/Dialog';
import { messageOf } from '@/components/ui/ErrorState';
import { Field } from '@/components/ui/Field';
import { Notice } from '@/components/ui/Notice';
import { Text } from '@/components/ui/Text';
import { Toggle } from '@/components/ui/Toggle';
import { useToast } from '@/components/ui/ToastProvider';
import { space } from '@/constants/theme';
import { useCreateToken } from '@/hooks/tokens';
import { SCOPE_SUMMARY, tokenScopeSchema, type TokenScope } from '@/shared/contracts/roles';
import { SCOPE_LABELS } from './scope-words';

const LIVES = [
  { value: '30', label: '30 days' },
  { value: '365', label: 'a year' },
  { value: 'never', label: 'without end' },
] as const;

/** Name, scopes and life of a token; then the token itself, this once. */
export function NewTokenDialog({ onClose }: { onClose: () => void }) {
  const [name, setName] = useState('');
  const [scopes, setScopes] = useState<readonly TokenScope[]>(['released-set:read']);
  const [life, setLife] = useState<(typeof LIVES)[number]['value']>('365');
  const create = useCreateToken();
  if (create.data) return <Made name={create.data.name} token={create.data.token} onClose={onClose} />;
  const incomplete = name.trim() === '' || scopes.length === 0;
  const submit = async () => {
    try {
      await create.mutateAsync({
        name: name.trim(),
        scopes: [...scopes],
        expiresInDays: life === 'never' ? null : Number(life),
      });
    } catch {
      // shown below from the mutation's own state
    }
  };
  return (
    <Dialog
      open
      title="New API token"
      onClose={onClose}
      footer={
        <>
          <Button label="Cancel" onPress={onClose} />
          <Button
            label="Make it"
            kind="primary"
            disabled={incomplete}
            reason="Give it a name and at least one scope."
            busy={create.isPending}
            onPress={() => void submit()}
          />
        </>
      }
    >
      <Field label="Name" value={name} onChangeText={setName} placeholder="Flight code build" required />
      <View style={{ gap: space.xs }}>
        {tokenScopeSchema.options.map((scope) => (
          <Toggle
            key={scope}
            label={SCOPE_LABELS[scope]}
            hint={SCOPE_SUMMARY[scope]}
            value={scopes.includes(scope)}
            onChange={(on) => setScopes((old) => (on ? [...old, scope] : old.filter((one) => one !== scope)))}
          />
        ))}
      </View>
      <Choice label="It works" shape="segments" options={LIVES} value={life} onChange={setLife} />
      {create.isError ? (
        <Notice tone="vermilion" urgent title="Not made">
          {messageOf(create.error)}
        </Notice>
      ) : null}
    </Dialog>
  );
}

function Made({ name, token, onClose }: { name: string; token: string; onClose: () => void }) {
  const toast = useToast();
  const copy = async () => {
    try {
      await navigator.clipboard.writeText(token);
      toast({ message: 'Copied.' });
    } catch {
      toast({
        message: 'This browser does not let pages copy: mark the token and copy it yourself.',
        tone: 'ochre',
      });
    }
  };
  return (
    <Dialog
      open
      title={`${name} is made`}
      onClose={onClose}
      footer={
        <>
          <Button label="Copy" icon="copy" onPress={() => void copy()} />
          <Button label="Done" kind="primary" onPress={onClose} />
        </>
      }
    >
      <Notice tone="ochre" title="Keep it now">
        It is shown this once. Whoever has it may do what its scopes allow.
      </Notice>
      <Field label="Token" value={token} editable={false} multiline />
      <Text variant="label" tone="soft">
        Sent as a header: Authorization: Bearer, a blank, and the token.
      </Text>
    </Dialog>
  );
}
