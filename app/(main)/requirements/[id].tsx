import { useLocalSearchParams } from 'expo-router';
import { EditRequirementScreen } from '@/components/layout/fetched-screens';

export default function Requirement() {
  const { id } = useLocalSearchParams<{ id: string }>();
  return <EditRequirementScreen id={id} />;
}
