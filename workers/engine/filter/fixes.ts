/** GNSS rows made ready for the filter: measurement times, variances, what is present. */
import type { Parameters } from '@/shared/contracts/parameters';
import type { Outage } from '@/shared/contracts/runs';
import type { GnssColumns } from '../types';

/** Which of north, east, down are measured: bits 1, 2, 4. */
export const ALL_AXES = 7;

export interface Fixes {
  count: number;
  /** Epoch − latency, s; not decreasing. */
  timeS: Float64Array;
  latRad: Float64Array;
  lonRad: Float64Array;
  heightM: Float64Array;
  velocity: readonly [Float64Array, Float64Array, Float64Array];
  /** R of the position, m², and of the velocity, (m/s)², three a fix. */
  positionVariance: Float64Array;
  velocityVariance: Float64Array;
  /** Axes measured, as bits; 0: none. */
  positionAxes: Uint8Array;
  velocityAxes: Uint8Array;
}

/**
 * R = (σ × scale)², σ the receiver's own where the parameters say so and it gave one, else the fixed one; never below
 * the floor; then times the stated inflation for errors that are correlated in time. Values that are not finite count as missing.
 */
export function prepareFixes(gnss: GnssColumns, parameters: Parameters['gnss']): Fixes {
  const count = gnss.timeS.length;
  const fixes: Fixes = {
    count,
    timeS: gnss.timeS.map((t) => t - parameters.latencyS),
    latRad: gnss.latRad,
    lonRad: gnss.lonRad,
    heightM: gnss.heightM,
    velocity: gnss.velocityNed,
    positionVariance: new Float64Array(3 * count),
    velocityVariance: new Float64Array(3 * count),
    positionAxes: new Uint8Array(count),
    velocityAxes: new Uint8Array(count),
  };
  const { positionSigmaHorizontalM: ph, positionSigmaVerticalM: pv } = parameters;
  const { velocitySigmaHorizontalMPerS: vh, velocitySigmaVerticalMPerS: vv } = parameters;
  const receiver = parameters.sigmaSource === 'receiver';
  for (let j = 0; j < count; j += 1) {
    for (let axis = 0; axis < 3; axis += 1) {
      const a = axis as 0 | 1 | 2;
      const position = choose(receiver, gnss.positionSigma[a][j]!, axis < 2 ? ph : pv);
      const velocity = choose(receiver, gnss.velocitySigma[a][j]!, axis < 2 ? vh : vv);
      fixes.positionVariance[3 * j + axis] =
        Math.max(position * parameters.positionScale, parameters.positionFloorM) ** 2 *
        parameters.positionInflation;
      fixes.velocityVariance[3 * j + axis] =
        Math.max(velocity * parameters.velocityScale, parameters.velocityFloorMPerS) ** 2 *
        parameters.velocityInflation;
    }
    if (!Number.isFinite(fixes.timeS[j]!)) continue;
    fixes.positionAxes[j] = positionAxesOf(gnss, j);
    // A velocity that is not to be used is not to align by either; a position is still needed to start from.
    fixes.velocityAxes[j] = parameters.useVelocity ? velocityAxesOf(gnss, j) : 0;
  }
  return fixes;
}

const choose = (receiver: boolean, own: number, fixed: number) =>
  receiver && Number.isFinite(own) && own > 0 ? own : fixed;

function positionAxesOf(gnss: GnssColumns, j: number): number {
  if (!Number.isFinite(gnss.latRad[j]!) || !Number.isFinite(gnss.lonRad[j]!)) return 0;
  return Number.isFinite(gnss.heightM[j]!) ? ALL_AXES : 3;
}

function velocityAxesOf(gnss: GnssColumns, j: number): number {
  const [n, e, d] = gnss.velocityNed;
  if (!Number.isFinite(n[j]!) || !Number.isFinite(e[j]!)) return 0;
  return Number.isFinite(d[j]!) ? ALL_AXES : 3;
}

/** What the windows withhold of each fix: bit 1 position, bit 2 velocity. Windows are [start, end) in measurement time. */
export function withheldBy(fixes: Fixes, outages: readonly Outage[]): Uint8Array {
  const out = new Uint8Array(fixes.count);
  for (const window of outages) {
    const { withhold } = window;
    const all = withhold === 'gnss';
    const bits = (all || withhold === 'position' ? 1 : 0) | (all || withhold === 'velocity' ? 2 : 0);
    if (bits === 0) continue;
    for (let j = 0; j < fixes.count; j += 1)
      if (fixes.timeS[j]! >= window.startS && fixes.timeS[j]! < window.endS) out[j] = out[j]! | bits;
  }
  return out;
}
