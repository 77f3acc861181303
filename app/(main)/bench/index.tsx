import { useLocalSearchParams } from 'expo-router';
import { BenchPicker } from '@/components/bench/BenchPicker';

export default function BenchIndex() {
  const { set, version, pick } = useLocalSearchParams<{ set?: string; version?: string; pick?: string }>();
  return (
    <BenchPicker setId={set} version={version ? Number(version) : undefined} pick={pick !== undefined} />
  );
}
