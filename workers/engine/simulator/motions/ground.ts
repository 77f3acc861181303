/** A vehicle on wheels: goes where it points, on a surface with slope and crossfall, on springs. */
import type { RandomSource } from '../../random';
import type { Kinematics, Motion } from '../motion';
import { newProfilePoint, type SmoothProfile } from '../profile';

/** Local names: a global looked up in each call costs more than the call. */
const { atan, cos, max, sin } = Math;

export interface GroundVehicle {
  kind: Motion['kind'];
  /** Speed over the ground (m/s) and turn rate (rad/s). */
  speed: SmoothProfile;
  turnRate: SmoothProfile;
  initialCourse: number;
  /** Slope (rise a metre) and crossfall (rad) as waves along the way: amplitude, wavelength (m), phase (rad). */
  slope: readonly Wave[];
  crossfall: readonly Wave[];
  /** Nose-up a unit of forward acceleration and lean outward a unit of sideways acceleration, rad·s²/m. */
  squat: number;
  lean: number;
  /** Rocking on the springs, growing with speed: rad a m/s, Hz. */
  rockPerSpeed: number;
  rockHz: number;
}

export interface Wave {
  amplitude: number;
  lengthM: number;
  phase: number;
}

/** Waves with seeded phases. */
export function waves(
  random: RandomSource,
  ...shapes: readonly [amplitude: number, lengthM: number][]
): Wave[] {
  return shapes.map(([amplitude, lengthM]) => ({
    amplitude,
    lengthM,
    phase: 2 * Math.PI * random.uniform(),
  }));
}

export function groundMotion(vehicle: GroundVehicle): Motion {
  const v = newProfilePoint();
  const r = newProfilePoint();
  const slope = { value: 0, perMetre: 0 };
  const fall = { value: 0, perMetre: 0 };
  const rock = 2 * Math.PI * vehicle.rockHz;
  const evaluate = (t: number, out: Kinematics) => {
    vehicle.speed.at(t, v);
    vehicle.turnRate.at(t, r);
    const speed = v.value;
    sumWaves(vehicle.slope, v.integral, slope);
    sumWaves(vehicle.crossfall, v.integral, fall);
    const yaw = vehicle.initialCourse + r.integral;
    const c = cos(yaw);
    const s = sin(yaw);
    out.vn = speed * c;
    out.ve = speed * s;
    out.vd = -speed * slope.value;
    out.an = v.rate * c - speed * s * r.value;
    out.ae = v.rate * s + speed * c * r.value;
    out.ad = -(v.rate * slope.value + speed * speed * slope.perMetre);
    out.yaw = yaw;
    out.yawRate = r.value;
    const swing = vehicle.rockPerSpeed * sin(rock * t);
    const swingRate = vehicle.rockPerSpeed * rock * cos(rock * t);
    out.pitch = atan(slope.value) + vehicle.squat * v.rate + 0.5 * swing * speed;
    out.pitchRate =
      (slope.perMetre * speed) / (1 + slope.value * slope.value) +
      vehicle.squat * v.curve +
      0.5 * (swingRate * speed + swing * v.rate);
    // Sideways acceleration is speed × turn rate, positive to the right: the body leans left.
    out.roll = fall.value - vehicle.lean * speed * r.value + swing * speed;
    out.rollRate =
      fall.perMetre * speed -
      vehicle.lean * (v.rate * r.value + speed * r.rate) +
      swingRate * speed +
      swing * v.rate;
  };
  return { kind: vehicle.kind, evaluate, bandwidthHz: max(vehicle.rockHz, 2) };
}

function sumWaves(list: readonly Wave[], distance: number, out: { value: number; perMetre: number }): void {
  out.value = 0;
  out.perMetre = 0;
  for (const wave of list) {
    const k = (2 * Math.PI) / wave.lengthM;
    out.value += wave.amplitude * sin(k * distance + wave.phase);
    out.perMetre += wave.amplitude * k * cos(k * distance + wave.phase);
  }
}
