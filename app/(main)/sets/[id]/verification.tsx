import { useLocalSearchParams } from 'expo-router';
import { MatrixScreen } from '@/components/verification/MatrixScreen';

export default function Verification() {
  const { id, version } = useLocalSearchParams<{ id: string; version?: string }>();
  return <MatrixScreen of={{ setId: id, number: Number(version ?? 1) }} />;
}
