/**
 * Raw uploads to a decoded recording: heads are read and mapped first, then each file streams once through its decoder
 * into the store. A fault anywhere throws IntakeRejected; whoever calls clears what was written by then.
 */
import type { HealthReport, Strip, TimeOrigin } from '@/shared/contracts/recordings';
import { IDENTITY_AXES } from '@/shared/contracts/vehicles';
import type { AidKind } from '../recordings/aids';
import { writeTable, type Columns, type WrittenFile } from '../recordings/arrow-file';
import { gnssColumns } from '../recordings/load';
import { storeKeys } from '../store/types';
import { checkClocks } from './check-clocks';
import { decodeAids } from './decode-aids';
import { decodeImu } from './decode-imu';
import { decodeGnss, decodeReference, noGnss } from './decode-track';
import { healthReport } from './health-report';
import { defectFindings } from './defect-findings';
import { clockOf, proposedOrigin, type IntakeContext } from './intake-context';
import { sensorRoles } from './map-columns';
import { motionFindings } from './motion-findings';
import { stripOf } from './strip';

export type { IntakeContext } from './intake-context';

export interface DecodedFiles {
  startS: number;
  endS: number;
  timeOrigin: TimeOrigin;
  health: HealthReport;
  strip: Strip;
  gnss: Columns;
  written: Record<'imu' | 'gnss', WrittenFile> & {
    reference: WrittenFile | null;
    aids: Partial<Record<AidKind, WrittenFile>>;
  };
}

export async function decodeFiles(context: IntakeContext): Promise<DecodedFiles> {
  const map = context.map.imu!;
  const role = sensorRoles(map, context.heads).gyro;
  const originS = proposedOrigin(context, role, map.time);
  const gnss = context.map.gnss ? await decodeGnss(context, originS) : noGnss();
  const imu = await decodeImu(context, originS);
  const { facts } = imu;
  const axes = map.axes ?? context.vehicleAxes ?? IDENTITY_AXES;
  const fixes = gnssColumns(gnss.columns);
  const inForce = { map: context.map, axes };
  // The beginnings of two files need not meet.
  if (context.rowLimit === Infinity && gnss.report.epochs > 0)
    checkClocks(context, originS, facts, gnss.report, fixes, inForce);
  const reference = await decodeReference(context, originS, [facts.startS, facts.endS]);
  const aids = await decodeAids(context, originS);
  const matched = [...motionFindings(facts, fixes, inForce), ...defectFindings(facts, fixes)];
  await context.breathe();
  const gnssFile = await writeTable(context.store, storeKeys.gnss(context.recordingId), gnss.columns);
  return {
    startS: facts.startS,
    endS: facts.endS,
    timeOrigin: clockOf(context, role, map.time, originS).timeOrigin(),
    health: healthReport(
      facts,
      gnss.report,
      context.assumed,
      [...imu.findings, ...gnss.findings, ...aids.findings],
      matched,
    ),
    strip: stripOf(facts, gnss.columns),
    gnss: gnss.columns,
    written: { imu: imu.written, gnss: gnssFile, reference, aids: aids.written },
  };
}
