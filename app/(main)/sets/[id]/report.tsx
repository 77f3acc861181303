import { useLocalSearchParams } from 'expo-router';
import { ReportScreen } from '@/components/layout/fetched-screens';

export default function Report() {
  const { id, version } = useLocalSearchParams<{ id: string; version?: string }>();
  return <ReportScreen of={{ setId: id, number: Number(version ?? 1) }} />;
}
