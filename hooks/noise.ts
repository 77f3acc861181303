/** Sensor noise of a recording: asked for by stretch, and kept while the page lives. */
import { useQuery } from '@tanstack/react-query';
import type { NoiseAnalysis } from '@/shared/contracts/noise';
import { api } from './api';

/** `spanS` null: the longest stretch at rest. The analysis of a decoded recording does not change. */
export function useNoise(recordingId: string, spanS: readonly [number, number] | null) {
  return useQuery({
    queryKey: ['recordings', 'noise', recordingId, spanS],
    queryFn: ({ signal }) =>
      api<NoiseAnalysis>(`/recordings/${recordingId}/noise`, {
        method: 'POST',
        body: spanS ? { fromS: spanS[0], toS: spanS[1] } : {},
        signal,
      }),
    staleTime: Infinity,
    retry: false,
  });
}
