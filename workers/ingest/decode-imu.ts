/** The IMU of a recording, from one file or two, streamed into the store. */
import type { HealthFinding } from '@/shared/contracts/recordings';
import { IDENTITY_AXES } from '@/shared/contracts/vehicles';
import { ArrowFileWriter, type WrittenFile } from '../recordings/arrow-file';
import { IMU_COLUMNS, SAMPLING_KEY } from '../recordings/files';
import { storeKeys } from '../store/types';
import { headerOnly } from './csv';
import { imuConversion, samplingFault, stampShift } from './imu-conversion';
import { ImuDecoder } from './imu-decoder';
import { ImuHealth, type ImuFacts } from './imu-health';
import {
  clockOf,
  eachBatch,
  merged,
  nominalInterval,
  noteFindings,
  readerOf,
  type IntakeContext,
} from './intake-context';
import { columnsOfImu, sensorRoles } from './map-columns';
import { FILE_NAMES, rejection } from './problems';
import { SensorPartner } from './sensor-partner'; // prettier-ignore

export interface DecodedImu {
  facts: ImuFacts;
  findings: HealthFinding[];
  written: WrittenFile;
}

/** Throws IntakeRejected; what was written by then is removed. */
export async function decodeImu(context: IntakeContext, originS: number): Promise<DecodedImu> {
  const map = context.map.imu!;
  checkSampling(context);
  const roles = sensorRoles(map, context.heads);
  const clock = clockOf(context, roles.gyro, map.time, originS);
  const nominalS = nominalInterval(context, roles.gyro, map.time, columnsOfImu(map, 'gyro').slice(map.time.columns.length));
  const health = new ImuHealth(nominalS, map.sampling);
  const partner = map.accelTime ? await partnerOf(context, originS) : null;
  const columns = partner ? map.gyro.columns : [...map.gyro.columns, ...map.accel.columns];
  const key = storeKeys.imu(context.recordingId);
  const writer = new ArrowFileWriter(context.store, key, IMU_COLUMNS, new Map([[SAMPLING_KEY, map.sampling]]));
  const decoder = new ImuDecoder(
    readerOf(context, roles.gyro, clock, map.time, columns.map((name) => ({ name }))),
    imuConversion(map, map.axes ?? context.vehicleAxes ?? IDENTITY_AXES),
    stampShift(map.time.stamp, nominalS),
    health,
    (piece) => writer.write(piece),
    { partner, othersRows: merged(context) || (partner !== null && roles.gyro === roles.accel) },
  );
  try {
    const notes = await eachBatch(context, roles.gyro, (batch) => decoder.push(batch));
    decoder.finish();
    const facts = health.finish();
    if (facts.samples < 2) throw partner && decoder.unpaired > 1 ? apart(decoder.unpaired) : headerOnly('imu');
    const findings = [...noteFindings(roles.gyro, notes), ...unpairedFindings(decoder.unpaired)];
    return { facts, findings, written: await writer.finish() };
  } catch (error) {
    await writer.abort(error as Error);
    throw error;
  } finally {
    await partner?.close();
  }
} // prettier-ignore

function checkSampling(context: IntakeContext): void {
  const fault = samplingFault(context.map.imu!);
  if (!fault) return;
  throw rejection('sampling', { file: 'imu' }, fault, 'Correct the units or the sampling on the mapping screen.');
} // prettier-ignore

async function partnerOf(context: IntakeContext, originS: number): Promise<SensorPartner> {
  const map = context.map.imu!;
  const time = map.accelTime!;
  const role = sensorRoles(map, context.heads).accel;
  const nominalS = nominalInterval(context, role, time, map.accel.columns);
  return SensorPartner.open(context, {
    role,
    reader: readerOf(context, role, clockOf(context, role, time, originS), time, map.accel.columns.map((name) => ({ name }))),
    shiftS: stampShift(time.stamp, nominalS),
    nominalS,
    exact: map.sampling === 'increment',
  });
} // prettier-ignore

const apart = (count: number) =>
  rejection(
    'sensors-apart', { file: 'imu' },
    `None of ${count} gyro samples of the ${FILE_NAMES.imu} has accelerometer samples around it: the two tell different times.`,
    'Check the time columns of both sensors on the mapping screen, and give the offset where their clocks differ.',
  ); // prettier-ignore

function unpairedFindings(count: number): HealthFinding[] {
  if (count === 0) return [];
  const sentence = `${count === 1 ? 'One gyro sample' : `${count} gyro samples`} had no accelerometer samples around and dropped out.`;
  const figure = { value: count, unit: 'samples' };
  return [{ code: 'unpaired', severity: count > 10 ? 'warn' : 'info', sentence, figure, intervalsS: [], remedy: null }];
} // prettier-ignore
