import { useLocalSearchParams } from 'expo-router';
import { SetScreen } from '@/components/layout/fetched-screens';

export default function SetRoute() {
  const { id } = useLocalSearchParams<{ id: string }>();
  return <SetScreen id={id} />;
}
