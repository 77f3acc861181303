/** A drive with a shock beyond the accelerometers' range, and its truth. */
import type { SimulatedRecording } from '@/workers/engine/simulator/scenario';

/**
 * Lays a forward shock of `shockMPerS2` over `samples` samples from `atS` into the recording: the IMU shows it cut at
 * `rangeMPerS2`, the truth is faster by the whole of it from then on. GNSS after it still tells of the drive without the
 * shock: only what coasts from before it can be compared.
 */
export function addShock(
  { imu, reference }: SimulatedRecording,
  {
    atS,
    samples,
    shockMPerS2,
    rangeMPerS2,
  }: Record<'atS' | 'samples' | 'shockMPerS2' | 'rangeMPerS2', number>,
): void {
  const k = imu.timeS.findIndex((t) => t >= atS);
  const intervalS = imu.timeS[k]! - imu.timeS[k - 1]!;
  for (let i = k; i < k + samples; i += 1) imu.accel[0][i] = rangeMPerS2;
  const gain = samples * intervalS * shockMPerS2;
  const yaw = reference.attitude[2][k]!;
  for (let i = k; i < imu.timeS.length; i += 1) {
    const t = imu.timeS[i]! - imu.timeS[k]!;
    const latRad = reference.latRad[i]! + (gain * Math.cos(yaw) * t) / 6.37e6;
    reference.velocityNed[0][i] = reference.velocityNed[0][i]! + gain * Math.cos(yaw);
    reference.velocityNed[1][i] = reference.velocityNed[1][i]! + gain * Math.sin(yaw);
    reference.latRad[i] = latRad;
    reference.lonRad[i] = reference.lonRad[i]! + (gain * Math.sin(yaw) * t) / (6.39e6 * Math.cos(latRad));
  }
}
