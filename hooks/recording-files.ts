/** A recording's files for download, and stopping what makes them. */
import { useMutation, useQueryClient } from '@tanstack/react-query';
import type { DecodedChannel } from '@/shared/contracts/recording-files';
import type { Recording } from '@/shared/contracts/recordings';
import { api, downloadUrl } from './api';
import { recordingKeys } from './recordings';

/** Address of the decoded columns of `channel`. */
export const decodedUrl = (id: string, format: 'arrow' | 'csv', channel: DecodedChannel): string =>
  downloadUrl(`/recordings/${id}/decoded.${format}`, { channel });

/** Address of the health report as a file. */
export const healthFileUrl = (id: string): string => downloadUrl(`/recordings/${id}/health.json`);

/** Stops the decoding; the files are kept. */
export function useStopDecoding(id: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: () => api<Recording>(`/recordings/${id}/cancel`, { method: 'POST' }),
    onSuccess: (recording) => {
      client.setQueryData(recordingKeys.one(id), recording);
      return client.invalidateQueries({ queryKey: ['recordings', 'list'] });
    },
    // It may have ended by itself a moment before.
    onError: () => client.invalidateQueries({ queryKey: recordingKeys.one(id) }),
  });
}
