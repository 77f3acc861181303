import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import { Form } from '@/components/forms/Form';
import { FormField } from '@/components/forms/FormField';
import { FormProblem } from '@/components/forms/FormProblem';
import { showProblem } from '@/components/forms/problem';
import { Button } from '@/components/ui/Button';
import { Notice } from '@/components/ui/Notice';
import { TextLink } from '@/components/ui/TextLink';
import { useInstallation, useRequestReset } from '@/hooks/accounts';
import { resetRequestSchema } from '@/shared/contracts/accounts';
import { AuthPage } from './AuthPage';

/** Asks for a reset link; the answer is the same whether the address is known or not. */
export function ForgotPasswordScreen() {
  const installation = useInstallation();
  const request = useRequestReset();
  const { control, handleSubmit, setError, formState } = useForm<{ email: string }>({
    resolver: zodResolver(resetRequestSchema),
    defaultValues: { email: '' },
  });
  const submit = handleSubmit(async (input) => {
    try {
      await request.mutateAsync(input);
    } catch (error) {
      showProblem(error, ['email'], setError);
    }
  });
  const whereMailGoes = installation.data?.mailSink
    ? ' This installation sends no mail: an admin finds the message under Mail.'
    : '';
  return (
    <AuthPage title="Reset the password" lead="You get a link by e-mail; it works once and for a short time.">
      {request.isSuccess ? (
        <Notice tone="pine" urgent title="On its way">
          {`If the address belongs to an account, a link is on its way to it.${whereMailGoes}`}
        </Notice>
      ) : (
        <Form label="Reset the password">
          <FormProblem title="Not sent" message={formState.errors.root?.message} />
          <FormField
            control={control}
            name="email"
            label="E-mail"
            inputMode="email"
            autoCapitalize="none"
            autoComplete="username"
            required
            onSubmitEditing={() => void submit()}
          />
          <Button
            label="Send the link"
            kind="primary"
            wide
            busy={formState.isSubmitting}
            onPress={() => void submit()}
          />
        </Form>
      )}
      <TextLink href="/sign-in" label="Back to sign-in" />
    </AuthPage>
  );
}
