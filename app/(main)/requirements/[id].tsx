import { useLocalSearchParams } from 'expo-router';
import { EditRequirementScreen } from '@/components/requirements/EditRequirementScreen';

export default function Requirement() {
  const { id } = useLocalSearchParams<{ id: string }>();
  return <EditRequirementScreen id={id} />;
}
