import { zodResolver } from '@hookform/resolvers/zod';
import { router, useLocalSearchParams } from 'expo-router';
import { useForm } from 'react-hook-form';
import { Form } from '@/components/forms/Form';
import { FormField } from '@/components/forms/FormField';
import { FormProblem } from '@/components/forms/FormProblem';
import { showProblem } from '@/components/forms/problem';
import { Button } from '@/components/ui/Button';
import { ErrorState } from '@/components/ui/ErrorState';
import { Notice } from '@/components/ui/Notice';
import { SkeletonList } from '@/components/ui/Skeleton';
import { TextLink } from '@/components/ui/TextLink';
import { useAcceptInvitation, useInvitationPreview } from '@/hooks/accounts';
import {
  invitationAcceptSchema,
  type InvitationAccept,
  type InvitationPreview,
} from '@/shared/contracts/accounts';
import { ROLE_SUMMARY } from '@/shared/contracts/roles';
import { AuthPage } from './AuthPage';

/** Where an invitation's link leads. */
export function InvitationScreen() {
  const { token = '' } = useLocalSearchParams<{ token?: string }>();
  const preview = useInvitationPreview(token);
  if (token === '')
    return (
      <AuthPage title="Invitation">
        <Notice tone="ochre" title="The link is not complete">
          Open the link from the e-mail as a whole, or ask the admin who invited you for a new one.
        </Notice>
      </AuthPage>
    );
  if (preview.isError)
    return (
      <AuthPage title="Invitation">
        <ErrorState title="This invitation cannot be opened" error={preview.error} />
        <TextLink href="/sign-in" label="To sign-in" />
      </AuthPage>
    );
  if (!preview.data)
    return (
      <AuthPage title="Invitation">
        <SkeletonList label="the invitation" rows={1} />
      </AuthPage>
    );
  return (
    <AuthPage
      title={`Join ${preview.data.workspaceName}`}
      lead={`You are invited as ${preview.data.role}. ${ROLE_SUMMARY[preview.data.role]}`}
    >
      <AcceptForm token={token} preview={preview.data} />
    </AuthPage>
  );
}

function AcceptForm({ token, preview }: { token: string; preview: InvitationPreview }) {
  const accept = useAcceptInvitation(token);
  const { control, handleSubmit, setError, formState } = useForm<InvitationAccept>({
    resolver: zodResolver(invitationAcceptSchema),
    defaultValues: preview.hasAccount ? { password: '' } : { name: '', password: '' },
  });
  const submit = handleSubmit(async (input) => {
    try {
      await accept.mutateAsync(input);
      router.replace('/');
    } catch (error) {
      showProblem(error, ['name', 'password'], setError);
    }
  });
  return (
    <Form label="Join">
      <FormProblem title="Not joined yet" message={formState.errors.root?.message} />
      {preview.hasAccount ? null : (
        <FormField control={control} name="name" label="Your name" autoComplete="name" required />
      )}
      <FormField
        control={control}
        name="password"
        label={preview.hasAccount ? `Password of ${preview.email}` : `Password for ${preview.email}`}
        hint={preview.hasAccount ? 'You have an account already: its password.' : 'At least 10 characters.'}
        secureTextEntry
        autoComplete={preview.hasAccount ? 'current-password' : 'new-password'}
        required
        onSubmitEditing={() => void submit()}
      />
      <Button label="Join" kind="primary" wide busy={formState.isSubmitting} onPress={() => void submit()} />
    </Form>
  );
}
