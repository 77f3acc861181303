import { zodResolver } from '@hookform/resolvers/zod';
import { Redirect } from 'expo-router';
import { useForm } from 'react-hook-form';
import { Form } from '@/components/forms/Form';
import { FormField } from '@/components/forms/FormField';
import { FormProblem } from '@/components/forms/FormProblem';
import { showProblem } from '@/components/forms/problem';
import { Button } from '@/components/ui/Button';
import { useFirstAdmin, useInstallation } from '@/hooks/accounts';
import { useMe } from '@/hooks/session';
import { firstAdminSchema, type FirstAdmin } from '@/shared/contracts/accounts';
import { AuthPage } from './AuthPage';

/** An empty installation: the first person becomes admin of the first workspace. */
export function FirstAdminScreen() {
  const me = useMe();
  const installation = useInstallation();
  const make = useFirstAdmin();
  const { control, handleSubmit, setError, formState } = useForm<FirstAdmin>({
    resolver: zodResolver(firstAdminSchema),
    defaultValues: { name: '', email: '', password: '', workspaceName: '' },
  });
  if (me.data) return <Redirect href="/" />;
  if (installation.data && !installation.data.needsFirstAdmin) return <Redirect href="/sign-in" />;
  const submit = handleSubmit(async (input) => {
    try {
      await make.mutateAsync(input);
    } catch (error) {
      showProblem(error, ['name', 'email', 'password', 'workspaceName'], setError);
    }
  });
  return (
    <AuthPage
      title="Set up Driftwright"
      lead="Nobody is here yet. You become the admin of the first workspace and invite the others."
    >
      <Form label="Set up Driftwright">
        <FormProblem title="Not set up yet" message={formState.errors.root?.message} />
        <FormField control={control} name="name" label="Your name" autoComplete="name" required />
        <FormField
          control={control}
          name="email"
          label="E-mail"
          inputMode="email"
          autoCapitalize="none"
          autoComplete="username"
          required
        />
        <FormField
          control={control}
          name="password"
          label="Password"
          hint="At least 10 characters."
          secureTextEntry
          autoComplete="new-password"
          required
        />
        <FormField
          control={control}
          name="workspaceName"
          label="Workspace"
          hint="Your team’s closed room, for instance the team’s name."
          required
          onSubmitEditing={() => void submit()}
        />
        <Button
          label="Set up and sign in"
          kind="primary"
          wide
          busy={formState.isSubmitting}
          onPress={() => void submit()}
        />
      </Form>
    </AuthPage>
  );
}
