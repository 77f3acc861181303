/** A simulated recording as raw uploads: the same three files that a test drive would bring, with exact truth as reference. */
import { createHash } from 'node:crypto';
import { Readable } from 'node:stream';
import type { FileRole } from '@/shared/contracts/recordings';
import { radToDeg } from '@/shared/units';
import { simulateScenario, type SimulatedRecording } from '../engine/simulator/scenario';
import type { ScenarioJob, ScenarioResult } from '../protocol';
import { GNSS_COLUMNS, IMU_COLUMNS, REFERENCE_COLUMNS } from '../recordings/files';
import { storeKeys } from '../store/types';
import type { JobHelpers } from './helpers';

type Column = Float64Array | { radians: Float64Array };
/** Truth between its rows is interpolated; the file stays small. */
const MAX_REFERENCE_HZ = 50;
const ROWS_A_PIECE = 1000;

export async function scenario(job: ScenarioJob, helpers: JobHelpers): Promise<ScenarioResult> {
  const simulated = simulateScenario(job.scenario);
  await helpers.breathe();
  const files: ScenarioResult['files'] = [];
  for (const [role, text] of Object.entries(scenarioFiles(simulated, job.scenario.imuRateHz))) {
    const hash = createHash('sha256');
    const key = storeKeys.raw(job.recordingId, role);
    const pieces = hashed(text, hash, helpers);
    const { bytes } = await helpers.store.put(key, Readable.from(pieces, { objectMode: false }));
    files.push({ role: role as FileRole, name: `${role}.csv`, key, bytes, sha256: hash.digest('hex') });
    helpers.progress(files.length / 3);
  }
  return { files };
}

/** The three files as text, piece by piece; headers and units as the intake knows them without a channel map. */
export function scenarioFiles(
  { imu, gnss, reference }: SimulatedRecording,
  imuRateHz: number,
): Record<'imu' | 'gnss' | 'reference', Iterable<string>> {
  const stride = Math.max(1, Math.ceil(imuRateHz / MAX_REFERENCE_HZ));
  return {
    imu: csv(IMU_COLUMNS, [imu.timeS, ...imu.gyro, ...imu.accel], 1),
    gnss: csv(
      GNSS_COLUMNS,
      [
        gnss.timeS,
        { radians: gnss.latRad },
        { radians: gnss.lonRad },
        gnss.heightM,
        ...gnss.velocityNed,
        ...gnss.positionSigma,
        ...gnss.velocitySigma,
      ],
      1,
    ),
    reference: csv(
      REFERENCE_COLUMNS,
      [
        reference.timeS,
        { radians: reference.latRad },
        { radians: reference.lonRad },
        reference.heightM,
        ...reference.velocityNed,
        ...reference.attitude.map((radians) => ({ radians })),
      ],
      stride,
    ),
  };
}

/** Every `stride`-th row; the shortest text of each number that reads back the same. */
function* csv(names: readonly string[], columns: readonly Column[], stride: number): Generator<string> {
  yield `${names.join(',')}\n`;
  const readers = columns.map((column) =>
    column instanceof Float64Array
      ? (row: number) => column[row]!
      : (row: number) => radToDeg(column.radians[row]!),
  );
  const rows = (columns[0] as Float64Array).length;
  let lines: string[] = [];
  for (let row = 0; row < rows; row += stride) {
    lines.push(readers.map((read) => cell(read(row))).join(','));
    if (lines.length === ROWS_A_PIECE) {
      yield `${lines.join('\n')}\n`;
      lines = [];
    }
  }
  if (lines.length > 0) yield `${lines.join('\n')}\n`;
}

const cell = (value: number) => (Number.isNaN(value) ? '' : String(value));

async function* hashed(
  text: Iterable<string>,
  hash: ReturnType<typeof createHash>,
  helpers: JobHelpers,
): AsyncGenerator<Buffer> {
  for (const piece of text) {
    const bytes = Buffer.from(piece);
    hash.update(bytes);
    yield bytes;
    await helpers.breathe();
  }
}
