import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import { Form } from '@/components/forms/Form';
import { FormField } from '@/components/forms/FormField';
import { FormProblem } from '@/components/forms/FormProblem';
import { showProblem } from '@/components/forms/problem';
import { Button } from '@/components/ui/Button';
import { signInSchema, type SignIn } from '@/shared/contracts/accounts';

export interface SignInFormProps {
  /** Signs in; a refusal is thrown. */
  onSubmit: (input: SignIn) => Promise<unknown>;
}

/** E-mail and password. */
export function SignInForm({ onSubmit }: SignInFormProps) {
  const { control, handleSubmit, setError, formState } = useForm<SignIn>({
    resolver: zodResolver(signInSchema),
    defaultValues: { email: '', password: '' },
  });
  const submit = handleSubmit(async (input) => {
    try {
      await onSubmit(input);
    } catch (error) {
      showProblem(error, ['email', 'password'], setError);
    }
  });
  return (
    <Form label="Sign in">
      <FormProblem title="Not signed in" message={formState.errors.root?.message} />
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
      <FormField
        control={control}
        name="password"
        label="Password"
        secureTextEntry
        autoComplete="current-password"
        required
        onSubmitEditing={() => void submit()}
      />
      <Button
        label="Sign in"
        kind="primary"
        wide
        busy={formState.isSubmitting}
        onPress={() => void submit()}
      />
    </Form>
  );
}
