import { useLocalSearchParams } from 'expo-router';
import { VehicleScreen } from '@/components/layout/fetched-screens';

export default function VehicleRoute() {
  const { id } = useLocalSearchParams<{ id: string }>();
  return <VehicleScreen id={id} />;
}
