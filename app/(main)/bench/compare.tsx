import { useLocalSearchParams } from 'expo-router';
import { CompareScreen } from '@/components/layout/fetched-screens';
import type { CompareQuery } from '@/components/compare/compare-link';

export default function Compare() {
  const { on, of, w } = useLocalSearchParams<Partial<CompareQuery>>();
  return <CompareScreen query={{ on, of, w }} />;
}
