import { useLocalSearchParams } from 'expo-router';
import { NoiseScreen } from '@/components/layout/fetched-screens';

export default function NoiseRoute() {
  const { id } = useLocalSearchParams<{ id: string }>();
  return <NoiseScreen id={id} />;
}
