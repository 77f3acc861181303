/** Columns of a decoded recording as CSV. */
import { tableCsv } from '../exports/csv';
import type { RecordingExportJob } from '../protocol';
import { readTable } from '../recordings/arrow-file';
import { storeKeys } from '../store/types';
import type { JobHelpers } from './helpers';
import { putText } from './text-file';

export async function recordingExport(
  { recordingId, channel, name }: RecordingExportJob,
  helpers: JobHelpers,
): Promise<{ key: string; bytes: number }> {
  const { columns } = await readTable(helpers.store, storeKeys[channel](recordingId));
  return putText(storeKeys.recordingExport(recordingId, name), tableCsv(columns), helpers);
}
