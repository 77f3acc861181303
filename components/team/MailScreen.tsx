import { Link } from 'expo-router';
import { Fragment } from 'react';
import { StyleSheet, View } from 'react-native';
import { hrefOf } from '@/components/layout/paths';
import { Screen } from '@/components/layout/Screen';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { Card } from '@/components/ui/Card';
import { EmptyState } from '@/components/ui/EmptyState';
import { ErrorState } from '@/components/ui/ErrorState';
import { Figures } from '@/components/ui/Figures';
import { formatDay } from '@/components/ui/format-day';
import { NoPermission } from '@/components/ui/NoPermission';
import { SkeletonList } from '@/components/ui/Skeleton';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { fonts, space } from '@/constants/theme';
import { useInstallation } from '@/hooks/accounts';
import { useCan } from '@/hooks/session';
import { useSinkMail } from '@/hooks/team';
import type { SinkMessage } from '@/shared/contracts/accounts';
import { MailQueue } from './MailQueue';
import { splitLinks } from './split-links';

const BY_SERVER =
  'Letters leave by the mail server. One that could not be sent is tried again, for three days.';

/** What has not left yet and, without a mail server, what the local sink caught, for an admin to pass on. */
export function MailScreen() {
  const { wide } = useBreakpoint();
  const mayRead = useCan('mail:read');
  const hasSink = useInstallation().data?.mailSink;
  return (
    <Screen
      title="Mail"
      subtitle={
        hasSink === false ? BY_SERVER : 'No mail server is set: letters stay here, for an admin to pass on.'
      }
      back={wide ? undefined : '/more'}
      width="text"
    >
      {mayRead ? (
        <>
          <MailQueue />
          {hasSink === false ? null : <Letters />}
        </>
      ) : (
        <NoPermission message="Only an admin reads the installation’s letters." />
      )}
    </Screen>
  );
}

function Letters() {
  const mail = useSinkMail();
  if (mail.isPending) return <SkeletonList label="letters" rows={3} />;
  if (mail.isError)
    return (
      <ErrorState
        title="There are no letters to show"
        error={mail.error}
        onRetry={() => void mail.refetch()}
      />
    );
  if (mail.data.length === 0)
    return (
      <EmptyState
        icon="mail"
        title="No letters"
        message="Invitations, password resets and letters about versions appear here as soon as one is sent."
      />
    );
  return mail.data.map((message) => <Letter key={message.id} message={message} />);
}

function Letter({ message }: { message: SinkMessage }) {
  return (
    <Card>
      <View style={styles.head}>
        <Text strong level={2} style={styles.subject}>
          {message.subject}
        </Text>
        <Figures tone="soft">{`to ${message.to} · ${formatDay(message.sentAt)}`}</Figures>
      </View>
      <LetterText text={message.text} />
    </Card>
  );
}

function LetterText({ text }: { text: string }) {
  const { palette } = useTheme();
  return (
    <Text variant="label" style={styles.text}>
      {splitLinks(text).map((part, at) =>
        part.path ? (
          <Link
            key={at}
            href={hrefOf(part.path)}
            style={{ color: palette.petrol, fontFamily: fonts.labelStrong, textDecorationLine: 'underline' }}
          >
            {part.text}
          </Link>
        ) : (
          <Fragment key={at}>{part.text}</Fragment>
        ),
      )}
    </Text>
  );
}

const styles = StyleSheet.create({
  head: { gap: 2 },
  subject: { fontSize: 17 },
  text: { lineHeight: 22, marginTop: space.xs },
});
