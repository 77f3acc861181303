import { type ReactNode } from 'react';
import { View } from 'react-native';
import { ErrorState } from '@/components/ui/ErrorState';
import { useTheme } from '@/components/ui/ThemeProvider';
import { space } from '@/constants/theme';
import { useMe } from '@/hooks/session';
import { useAppFonts } from './use-app-fonts';

/**
 * Holds the first drawing until the fonts are there and it is known who is signed in. The router must not draw before:
 * a page that is not drawn loses its place in the address.
 */
export function AppReady({ children }: { children: ReactNode }) {
  const fonts = useAppFonts();
  const me = useMe();
  const { palette } = useTheme();
  if (fonts && me.isLoadingError)
    return (
      <View role="main" style={{ padding: space.xl, maxWidth: 720, backgroundColor: palette.ground }}>
        <ErrorState
          title="Driftwright could not be reached"
          error={me.error}
          onRetry={() => void me.refetch()}
        />
      </View>
    );
  return fonts && !me.isPending ? children : null;
}
