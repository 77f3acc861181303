import { Redirect, useLocalSearchParams } from 'expo-router';
import { View } from 'react-native';
import { nextPath } from '@/components/layout/next-path';
import { hrefOf } from '@/components/layout/paths';
import { messageOf } from '@/components/ui/ErrorState';
import { Notice } from '@/components/ui/Notice';
import { TextLink } from '@/components/ui/TextLink';
import { space } from '@/constants/theme';
import { useInstallation } from '@/hooks/accounts';
import { useMe, useSignIn } from '@/hooks/session';
import { AuthPage } from './AuthPage';
import { DemoPeople } from './DemoPeople';
import { SignInForm } from './SignInForm';

/** Sign in, then on to where one wanted to go. */
export function SignInScreen() {
  const { next } = useLocalSearchParams<{ next?: string }>();
  const me = useMe();
  const installation = useInstallation();
  const signIn = useSignIn();
  const demo = useSignIn();
  if (me.data) return <Redirect href={hrefOf(nextPath(next))} />;
  if (installation.data?.needsFirstAdmin) return <Redirect href="/first-admin" />;
  return (
    <AuthPage title="Sign in" lead={next ? 'Then on to the page that you asked for.' : undefined}>
      <View style={{ gap: space.s }}>
        <SignInForm onSubmit={signIn.mutateAsync} />
        <TextLink href="/forgot-password" label="Forgot the password?" />
      </View>
      {demo.isError ? (
        <Notice tone="vermilion" urgent title="Not signed in">
          {messageOf(demo.error)}
        </Notice>
      ) : null}
      {installation.data?.demo ? (
        <DemoPeople
          people={installation.data.demoPeople}
          busy={demo.isPending}
          onChoose={({ email, password }) => demo.mutate({ email, password })}
        />
      ) : null}
    </AuthPage>
  );
}
