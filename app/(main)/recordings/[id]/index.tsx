import { useLocalSearchParams } from 'expo-router';
import { RecordingScreen } from '@/components/layout/fetched-screens';

export default function RecordingRoute() {
  const { id } = useLocalSearchParams<{ id: string }>();
  return <RecordingScreen id={id} />;
}
