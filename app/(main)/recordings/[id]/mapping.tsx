import { useLocalSearchParams } from 'expo-router';
import { MappingScreen } from '@/components/recordings/mapping/MappingScreen';

export default function MappingRoute() {
  const { id } = useLocalSearchParams<{ id: string }>();
  return <MappingScreen id={id} />;
}
