/** A small fixed-wing aircraft: take-off run, climbs, coordinated turns, speed changes. */
import { STANDARD_GRAVITY_M_S2 } from '@/shared/units';
import type { Kinematics, Motion, MotionOptions } from '../motion';
import { newProfilePoint, RAMP_SLOPE, SmoothProfile } from '../profile';
import { Route } from './route';

/** Local names: a global looked up in each call costs more than the call. */
const { abs, atan, atan2, cos, max, sin, tan } = Math;

const CRUISE = 32; // m/s
const PEAK_BANK = 0.65; // rad
/** Nose above the path at cruise speed, rad. */
const INCIDENCE = 0.05;

export function fixedWingMotion(options: MotionOptions): Motion {
  const fromGround = options.staticStartS > 0;
  const speed = new SmoothProfile(fromGround ? 0 : CRUISE);
  const climb = new SmoothProfile(0);
  const turnRate = new SmoothProfile(0);
  const incidence = new SmoothProfile(fromGround ? 0 : INCIDENCE);
  const route = new Route(options.staticStartS, options.initialHeadingRad, options.random, 6000);
  if (fromGround) takeOff(route, speed, climb, incidence);
  schedule(route, options.durationS, speed, climb, turnRate);
  return flight({ speed, climb, turnRate, incidence, initialCourse: options.initialHeadingRad });
}

interface Flight {
  speed: SmoothProfile;
  climb: SmoothProfile;
  turnRate: SmoothProfile;
  incidence: SmoothProfile;
  initialCourse: number;
}

function takeOff(route: Route, speed: SmoothProfile, climb: SmoothProfile, incidence: SmoothProfile): void {
  const run = 18;
  speed.rampTo(route.t, run, CRUISE);
  route.advance(run, CRUISE / 2);
  incidence.rampTo(route.t, 2, INCIDENCE);
  climb.rampTo(route.t + 1, 4, 3).rampTo(route.t + 25, 4, 0);
  route.advance(30, CRUISE);
}

/** Manoeuvres one after another: a turn, or straight flight with a climb or a change of speed. */
function schedule(
  route: Route,
  durationS: number,
  speed: SmoothProfile,
  climb: SmoothProfile,
  turnRate: SmoothProfile,
): void {
  let current = CRUISE;
  let height = 0;
  route.advance(route.between(4, 8), current);
  while (route.t < durationS + 1) {
    if (route.chance(0.55)) {
      const angle = route.pickTurn(0.5, 4);
      const ramp = 2.5;
      const most = (STANDARD_GRAVITY_M_S2 * tan(route.between(0.3, PEAK_BANK))) / current;
      const hold = max(abs(angle) / most - ramp, 1);
      turnRate.rampTo(route.t, ramp, angle / (hold + ramp)).rampTo(route.t + ramp + hold, ramp, 0);
      route.advance(hold + 2 * ramp, current, angle);
    } else if (route.chance(0.5)) {
      // Climbs and descents stay within 150 m of the first level.
      const rate = (height > 0 ? -1 : 1) * route.between(1.5, 3.5);
      const hold = route.between(8, 25);
      climb.rampTo(route.t, 3, rate).rampTo(route.t + 3 + hold, 3, 0);
      height += rate * (hold + 3);
      route.advance(hold + 6, current);
    } else {
      const target = route.between(26, 40);
      const length = max((abs(target - current) * RAMP_SLOPE) / 2, 4);
      speed.rampTo(route.t, length, target);
      route.advance(length, (current + target) / 2);
      current = target;
    }
    route.advance(route.between(2, 9), current);
  }
}

/** Coordinated flight: bank = atan(V·turn rate ÷ g), so that nothing slips. */
function flight(f: Flight): Motion {
  const v = newProfilePoint();
  const w = newProfilePoint();
  const r = newProfilePoint();
  const i = newProfilePoint();
  const evaluate = (t: number, out: Kinematics) => {
    f.speed.at(t, v);
    f.climb.at(t, w);
    f.turnRate.at(t, r);
    f.incidence.at(t, i);
    const yaw = f.initialCourse + r.integral;
    const c = cos(yaw);
    const s = sin(yaw);
    out.vn = v.value * c;
    out.ve = v.value * s;
    out.vd = -w.value;
    out.an = v.rate * c - v.value * s * r.value;
    out.ae = v.rate * s + v.value * c * r.value;
    out.ad = -w.rate;
    out.yaw = yaw;
    out.yawRate = r.value;
    const bank = (v.value * r.value) / STANDARD_GRAVITY_M_S2;
    out.roll = atan(bank);
    out.rollRate = (v.rate * r.value + v.value * r.rate) / STANDARD_GRAVITY_M_S2 / (1 + bank * bank);
    // Path angle atan2(climb, speed); both are 0 on the ground before the run.
    const path2 = v.value * v.value + w.value * w.value;
    out.pitch = atan2(w.value, v.value) + i.value;
    out.pitchRate = i.rate + (path2 === 0 ? 0 : (w.rate * v.value - w.value * v.rate) / path2);
  };
  return { kind: 'fixed-wing', evaluate, bandwidthHz: 2 };
}
