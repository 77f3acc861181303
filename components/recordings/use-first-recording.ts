import { useAddressFilter } from '@/components/lists/use-address-filter';
import { itemsOf, useRecordings } from '@/hooks/recordings';
import { RECORDING_KEYS, recordingQuery } from './recording-filter';

/** Of the list as it is narrowed down, else of all: what stands beside the list before one was chosen. */
export function useFirstRecording(): string | undefined {
  const filter = useAddressFilter(RECORDING_KEYS);
  const listed = itemsOf(useRecordings(recordingQuery(filter.values)).data)[0];
  const newest = itemsOf(useRecordings().data)[0];
  return (listed ?? newest)?.id;
}
