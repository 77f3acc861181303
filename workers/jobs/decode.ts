/** Raw uploads to a checked, decoded recording in the store. A bad file is an outcome that says what to do, not an error. */
import { createHash } from 'node:crypto';
import type { FileRole, IntakeProblem } from '@/shared/contracts/recordings';
import { previewOf, settleMaps, type SettledMaps } from '../ingest/channel-maps';
import { headerOnly, type CsvHead } from '../ingest/csv';
import { decodeFiles, type DecodedFiles } from '../ingest/decode-files';
import { IntakeRejected } from '../ingest/problems';
import { readTableHead } from '../ingest/tables';
import type { RawFile } from '../ingest/text-source';
import type { DecodeJob, DecodeResult } from '../protocol';
import { AID_KINDS } from '../recordings/aids';
import { writeDecodedNote } from '../recordings/files';
import { storeKeys, type Store } from '../store/types';
import { writeBaselineTrack } from './baseline-track';
import type { JobHelpers } from './helpers';

/** `rowLimit`: rows of each file after which reading stops. */
export async function decode(
  job: DecodeJob,
  helpers: JobHelpers,
  rowLimit = Infinity,
): Promise<DecodeResult> {
  const { store } = helpers;
  await removeDecoded(store, job.recordingId);
  const files = filesOf(job);
  const { heads, problems } = await readHeads(files, store);
  const previews = () => [...heads].map(([role, head]) => previewOf(role, head, []));
  if (problems.length > 0) return { outcome: 'rejected', channelMap: null, problems, previews: previews() };
  const settled = imuAlone(job, files, heads, settleMaps(heads, job.channelMap));
  if (settled.problems.length > 0)
    return {
      outcome: 'needs-mapping',
      channelMap: settled.map,
      problems: settled.problems,
      previews: settled.previews,
    };

  let reached = 0;
  try {
    const decoded = await decodeFiles({
      store,
      recordingId: job.recordingId,
      files,
      heads,
      map: settled.map,
      vehicleAxes: job.vehicleAxes,
      assumed: settled.assumed,
      rowLimit,
      progress: (share) => {
        // A file may be gone through twice.
        reached = Math.max(reached, share * 0.95);
        helpers.progress(reached);
      },
      breathe: helpers.breathe,
    });
    if (rowLimit === Infinity) await writeBaselineTrack(store, job.recordingId, decoded.gnss);
    const sha256 = hashOf(decoded.written);
    await writeDecodedNote(store, job.recordingId, {
      sha256,
      hasReference: decoded.written.reference !== null,
      aids: AID_KINDS.filter((kind) => decoded.written.aids[kind]),
    });
    helpers.progress(1);
    return {
      outcome: 'ready',
      channelMap: settled.map,
      startS: decoded.startS,
      endS: decoded.endS,
      hasReference: decoded.written.reference !== null,
      timeOrigin: decoded.timeOrigin,
      health: decoded.health,
      strip: decoded.strip,
      sha256,
      previews: settled.previews,
    };
  } catch (error) {
    await removeDecoded(store, job.recordingId);
    if (error instanceof IntakeRejected)
      return {
        outcome: 'rejected',
        channelMap: settled.map,
        problems: [...error.problems],
        previews: settled.previews,
      };
    throw error;
  }
}

/** No GNSS file was sent and the IMU's log holds no position whatever: it is an IMU by itself, and no fault. */
function imuAlone(
  job: DecodeJob,
  files: Map<FileRole, RawFile>,
  heads: Map<FileRole, CsvHead>,
  settled: SettledMaps,
): SettledMaps {
  const sent = job.files.some(({ role }) => role === 'gnss');
  if (sent || settled.map.gnss || job.channelMap?.gnss) return settled;
  const missing = settled.previews.find(({ role }) => role === 'gnss')?.missing ?? [];
  if (!missing.includes('latitude') || !missing.includes('longitude')) return settled;
  files.delete('gnss');
  heads.delete('gnss');
  return {
    ...settled,
    problems: settled.problems.filter(({ file }) => file !== 'gnss'),
    previews: settled.previews.filter(({ role }) => role !== 'gnss'),
  };
}

/** One log may hold the IMU and the GNSS: without a GNSS file the IMU's stands for it too. */
function filesOf(job: DecodeJob): Map<FileRole, RawFile> {
  const files = new Map<FileRole, RawFile>(job.files.map((file) => [file.role, file]));
  const imu = files.get('imu');
  if (imu && !files.has('gnss')) files.set('gnss', { ...imu, role: 'gnss' });
  return files;
}

/** Heads of all files; what is wrong with any of them is told at once, of one file only once. */
async function readHeads(files: ReadonlyMap<FileRole, RawFile>, store: Store) {
  const heads = new Map<FileRole, CsvHead>();
  const problems: IntakeProblem[] = [];
  for (const [role, file] of files) {
    const isSameFile = role === 'gnss' && file.key === files.get('imu')?.key;
    if (isSameFile && problems.length > 0) continue;
    try {
      const head = await readTableHead(store, file);
      heads.set(role, head);
      if (head.complete && head.rows.length < 2) throw headerOnly(role);
    } catch (error) {
      if (!(error instanceof IntakeRejected)) throw error;
      problems.push(...error.problems);
    }
  }
  return { heads, problems };
}

/** Over the hashes of the files, in the order IMU, GNSS, reference, aids. */
function hashOf({ imu, gnss, reference, aids }: DecodedFiles['written']): string {
  const hash = createHash('sha256');
  for (const file of [imu, gnss, reference, ...AID_KINDS.map((kind) => aids[kind])])
    if (file) hash.update(file.sha256, 'hex');
  return hash.digest('hex');
}

/** The note goes first: without it nobody takes the rest for a whole recording. */
async function removeDecoded(store: Store, recordingId: string): Promise<void> {
  const { decoded, imu, gnss, reference, gnssOnly } = storeKeys;
  for (const key of [decoded, imu, gnss, reference, gnssOnly]) await store.removePrefix(key(recordingId));
  await store.removePrefix(storeKeys.recordingExport(recordingId, ''));
  for (const kind of AID_KINDS) await store.removePrefix(storeKeys.aid(recordingId, kind));
}
