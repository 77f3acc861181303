import { useLocalSearchParams } from 'expo-router';
import { NoiseScreen } from '@/components/noise/NoiseScreen';

export default function NoiseRoute() {
  const { id } = useLocalSearchParams<{ id: string }>();
  return <NoiseScreen id={id} />;
}
