/** Positions that no vehicle reached: they leave the path of their neighbours by far more than the fixes scatter. */
import { nedOffset } from '../engine/geodesy';
import { percentile } from '../engine/statistics/descriptive';
import type { GnssColumns } from '../engine/types';

export interface GnssJump {
  /** From the last good fix to the first one after; of an excursion, to the first one after its return. */
  fromS: number;
  toS: number;
  sizeM: number;
}

/** Of the scatter, and of the receiver's own σ. */
const SIGMAS = 8;
const LEAST_M = 5;
/** What the vehicle's own acceleration may do between two fixes, m/s². */
const ACCELERATION = 12;
/** Fixes further apart than this cannot be judged, s. */
const LONGEST_S = 3.1;
/** Two steps that cancel each other to this share, at most this far apart (s), are an excursion and its return. */
const CANCELS = 0.35;
const LONGEST_EXCURSION_S = 120;
const MOST_KEPT = 500;

/** Steps that velocity (or, without it, the step before) does not explain. There and back again is one jump. */
export function gnssJumps(gnss: GnssColumns): GnssJump[] {
  const steps = stepsOf(gnss);
  const median =
    steps.length === 0
      ? 0
      : percentile(
          steps.map(({ missM }) => Math.hypot(...missM)),
          0.5,
        );
  const scatter = 1.4826 * median;
  const jumps: GnssJump[] = [];
  let out: Step | null = null;
  for (const step of steps) {
    const sizeM = Math.hypot(...step.missM);
    if (sizeM < Math.max(LEAST_M, SIGMAS * scatter, step.allowanceM)) continue;
    const last = jumps.at(-1);
    if (last && out && step.toS - out.fromS <= LONGEST_EXCURSION_S && cancel(out, step)) {
      last.toS = step.toS;
      out = null;
      continue;
    }
    jumps.push({ fromS: step.fromS, toS: step.toS, sizeM });
    out = step;
    if (jumps.length >= MOST_KEPT) break;
  }
  return jumps;
}

const cancel = (a: Step, b: Step) =>
  Math.hypot(a.missM[0] + b.missM[0], a.missM[1] + b.missM[1]) < CANCELS * Math.hypot(...a.missM);

interface Step {
  fromS: number;
  toS: number;
  /** Where the second position lies from where the first one and the velocity led: north, east, m. */
  missM: readonly [number, number];
  /** What is no surprise, m. */
  allowanceM: number;
}

function stepsOf(gnss: GnssColumns): Step[] {
  const steps: Step[] = [];
  const offset = new Float64Array(3);
  let last = -1;
  let before: { north: number; east: number; intervalS: number } | null = null;
  for (let j = 0; j < gnss.timeS.length; j += 1) {
    if (!Number.isFinite(gnss.latRad[j]! + gnss.lonRad[j]!)) continue;
    const intervalS = last < 0 ? Infinity : gnss.timeS[j]! - gnss.timeS[last]!;
    if (intervalS > 0 && intervalS <= LONGEST_S) {
      nedOffset(gnss.latRad[last]!, gnss.lonRad[last]!, 0, gnss.latRad[j]!, gnss.lonRad[j]!, 0, offset);
      const [north, east] = [offset[0]!, offset[1]!];
      const led = ledBy(gnss, last, j) ?? before;
      if (led) {
        const scale = intervalS / led.intervalS;
        const sigma = Math.max(0, gnss.positionSigma[0][j]! || 0, gnss.positionSigma[1][j]! || 0);
        steps.push({
          fromS: gnss.timeS[last]!,
          toS: gnss.timeS[j]!,
          missM: [north - led.north * scale, east - led.east * scale],
          allowanceM: SIGMAS * sigma + ACCELERATION * intervalS * intervalS,
        });
      }
      before = { north, east, intervalS };
    } else before = null;
    last = j;
  }
  return steps;
}

/** The way that the mean of two velocities makes. */
function ledBy(gnss: GnssColumns, a: number, b: number) {
  const [vn, ve] = gnss.velocityNed;
  const north = 0.5 * (vn[a]! + vn[b]!);
  const east = 0.5 * (ve[a]! + ve[b]!);
  const intervalS = gnss.timeS[b]! - gnss.timeS[a]!;
  return Number.isFinite(north + east)
    ? { north: north * intervalS, east: east * intervalS, intervalS }
    : null;
}
