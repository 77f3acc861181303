import type { ErrorBoundaryProps } from 'expo-router';
import { View } from 'react-native';
import { ThemeProvider } from '@/components/ui/ThemeProvider';
import { Button } from '@/components/ui/Button';
import { Notice } from '@/components/ui/Notice';
import { Text } from '@/components/ui/Text';
import { space } from '@/constants/theme';

/** A page that broke: says so, and offers to draw it again. */
export function RouteError({ error, retry }: ErrorBoundaryProps) {
  return (
    <ThemeProvider>
      <View role="main" style={{ padding: space.xl, gap: space.l, maxWidth: 720 }}>
        <Text variant="title">This page stopped</Text>
        <Notice
          tone="vermilion"
          urgent
          title="Nothing on the server is lost"
          actions={
            <>
              <Button label="Draw it again" kind="primary" onPress={() => void retry()} />
              <Button label="To the first page" onPress={() => location.assign('/')} />
            </>
          }
        >
          {error.message}
        </Notice>
      </View>
    </ThemeProvider>
  );
}
