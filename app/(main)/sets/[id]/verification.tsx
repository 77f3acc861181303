import { useLocalSearchParams } from 'expo-router';
import { MatrixScreen } from '@/components/layout/fetched-screens';

export default function Verification() {
  const { id, version } = useLocalSearchParams<{ id: string; version?: string }>();
  return <MatrixScreen of={{ setId: id, number: Number(version ?? 1) }} />;
}
