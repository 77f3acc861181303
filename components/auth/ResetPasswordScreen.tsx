import { zodResolver } from '@hookform/resolvers/zod';
import { useLocalSearchParams } from 'expo-router';
import { useForm } from 'react-hook-form';
import { Form } from '@/components/forms/Form';
import { FormField } from '@/components/forms/FormField';
import { FormProblem } from '@/components/forms/FormProblem';
import { showProblem } from '@/components/forms/problem';
import { Button } from '@/components/ui/Button';
import { Notice } from '@/components/ui/Notice';
import { TextLink } from '@/components/ui/TextLink';
import { useResetPassword } from '@/hooks/accounts';
import { resetSchema, type PasswordReset } from '@/shared/contracts/accounts';
import { AuthPage } from './AuthPage';

/** Where the mail's link leads: a new password. */
export function ResetPasswordScreen() {
  const { token = '' } = useLocalSearchParams<{ token?: string }>();
  const reset = useResetPassword();
  const { control, handleSubmit, setError, formState } = useForm<PasswordReset>({
    resolver: zodResolver(resetSchema),
    defaultValues: { token, password: '' },
  });
  const submit = handleSubmit(async (input) => {
    try {
      await reset.mutateAsync(input);
    } catch (error) {
      showProblem(error, ['password'], setError);
    }
  });
  if (token === '')
    return (
      <AuthPage title="Choose a new password">
        <Notice tone="ochre" title="The link is not complete">
          Open the link from the e-mail as a whole, or ask for a new one.
        </Notice>
        <TextLink href="/forgot-password" label="Ask for a new link" />
      </AuthPage>
    );
  if (reset.isSuccess)
    return (
      <AuthPage title="Choose a new password">
        <Notice tone="pine" urgent title="The password is changed">
          Sign in with the new one. Other devices are signed out.
        </Notice>
        <TextLink href="/sign-in" label="To sign-in" />
      </AuthPage>
    );
  return (
    <AuthPage title="Choose a new password">
      <Form label="New password">
        <FormProblem title="Not changed" message={formState.errors.root?.message} />
        <FormField
          control={control}
          name="password"
          label="New password"
          hint="At least 10 characters."
          secureTextEntry
          autoComplete="new-password"
          required
          onSubmitEditing={() => void submit()}
        />
        <Button
          label="Change the password"
          kind="primary"
          wide
          busy={formState.isSubmitting}
          onPress={() => void submit()}
        />
      </Form>
      <TextLink href="/forgot-password" label="Ask for a new link" />
    </AuthPage>
  );
}
