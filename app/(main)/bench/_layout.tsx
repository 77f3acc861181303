import { Slot } from 'expo-router';
import { StyleSheet, View } from 'react-native';

export { RouteError as ErrorBoundary } from '@/components/layout/RouteError';

/**
 * One bench at a time: no stack keeps an older one running behind it. Laid over its place, because the tabs' container
 * grows with its content and a bench must end at the lower edge of the screen.
 */
export default function BenchLayout() {
  return (
    <View style={StyleSheet.absoluteFill}>
      <Slot />
    </View>
  );
}
