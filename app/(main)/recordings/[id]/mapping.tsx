import { useLocalSearchParams } from 'expo-router';
import { MappingScreen } from '@/components/layout/fetched-screens';

export default function MappingRoute() {
  const { id } = useLocalSearchParams<{ id: string }>();
  return <MappingScreen id={id} />;
}
