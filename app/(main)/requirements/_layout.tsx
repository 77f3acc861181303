import { Stack } from 'expo-router';

/** Pages of their own, one after the other. */
export default function RequirementsLayout() {
  return (
    <Stack
      screenOptions={{
        headerShown: false,
        animation: 'none',
        contentStyle: { backgroundColor: 'transparent' },
      }}
    />
  );
}
