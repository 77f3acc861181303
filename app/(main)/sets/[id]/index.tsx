import { useLocalSearchParams } from 'expo-router';
import { SetScreen } from '@/components/sets/SetScreen';

export default function SetRoute() {
  const { id } = useLocalSearchParams<{ id: string }>();
  return <SetScreen id={id} />;
}
