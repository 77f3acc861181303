import { useLocalSearchParams } from 'expo-router';
import { BenchScreen } from '@/components/layout/fetched-screens';
import type { BenchQuery } from '@/components/bench/bench-link';

type Search = { recordingId: string } & Partial<Record<keyof BenchQuery, string>>;

export default function Bench() {
  const { recordingId, set, version, p, w, base, x, view } = useLocalSearchParams<Search>();
  return <BenchScreen recordingId={recordingId} query={{ set, version, p, w, base, x, view }} />;
}
