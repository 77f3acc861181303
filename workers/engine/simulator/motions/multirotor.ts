/** A multirotor: hovers, dashes to any side, climbs and turns on the spot; tilts to accelerate; shakes. */
import { STANDARD_GRAVITY_M_S2 } from '@/shared/units';
import type { Kinematics, Motion, MotionOptions } from '../motion';
import { newProfilePoint, SmoothProfile } from '../profile';
import { Route } from './route';

/** Local names: a global looked up in each call costs more than the call. */
const { atan, cos, max, sin } = Math;

export interface MultirotorOptions extends MotionOptions {
  /** Coning of the airframe while it flies: half-angle (rad) and frequency (Hz). */
  coning?: { angleRad: number; hz: number };
  /** Shaking by the rotors, m/s² and Hz; 0 m/s²: none. */
  vibration?: { accelerationMPerS2: number; hz: number };
}

/** Sideways drag a unit of speed, 1/s: what tilt a steady speed takes. */
const DRAG = 0.15;
const GROUND_ROLL = 0.012;
const GROUND_PITCH = -0.02;

export function multirotorMotion(options: MultirotorOptions): Motion {
  const course = {
    north: new SmoothProfile(0),
    east: new SmoothProfile(0),
    climb: new SmoothProfile(0),
    turnRate: new SmoothProfile(0),
    /** 0 on the ground with rotors at rest, 1 in flight. */
    airborne: new SmoothProfile(0),
  };
  schedule(new Route(options.staticStartS, 0, options.random, 300), options.durationS, course);
  const vibration = options.vibration ?? { accelerationMPerS2: 1.5, hz: 27 };
  return flight(course, options.initialHeadingRad, options.coning ?? { angleRad: 0, hz: 3 }, vibration);
}

interface Course {
  north: SmoothProfile;
  east: SmoothProfile;
  climb: SmoothProfile;
  turnRate: SmoothProfile;
  airborne: SmoothProfile;
}

function schedule(route: Route, durationS: number, course: Course): void {
  course.airborne.rampTo(route.t, 3, 1);
  course.climb.rampTo(route.t + 3, 2, 2).rampTo(route.t + 12, 2, 0);
  route.advance(15, 0);
  let height = 20;
  while (route.t < durationS + 1) {
    route.advance(route.between(2, 6), 0); // hover
    if (route.chance(0.65)) {
      // A dash along `direction`, the nose wherever it points; on half of them it turns on the way.
      route.course += route.pickTurn(0.3, Math.PI);
      const direction = route.course;
      const top = route.between(3, 9);
      const ramp = 1.2 + 0.35 * top;
      const hold = route.between(2, 9);
      course.north.rampTo(route.t, ramp, top * cos(direction)).rampTo(route.t + ramp + hold, ramp, 0);
      course.east.rampTo(route.t, ramp, top * sin(direction)).rampTo(route.t + ramp + hold, ramp, 0);
      if (route.chance(0.5)) spin(route, course, ramp + hold);
      route.advance(2 * ramp + hold, (top * (ramp + hold)) / (2 * ramp + hold));
    } else if (route.chance(0.5)) {
      const rate = (height > 40 ? -1 : 1) * route.between(0.8, 2);
      const hold = route.between(3, 8);
      course.climb.rampTo(route.t, 1.5, rate).rampTo(route.t + 1.5 + hold, 1.5, 0);
      height += rate * (hold + 1.5);
      route.advance(hold + 3, 0);
    } else {
      const length = route.between(3, 6);
      spin(route, course, length);
      route.advance(length, 0);
    }
  }
}

/** Turns the nose at up to 0.9 rad/s within `lengthS` from now. */
function spin(route: Route, course: Course, lengthS: number): void {
  const ramp = 1;
  const rate = route.between(0.2, 0.9) * (route.chance(0.5) ? 1 : -1);
  course.turnRate.rampTo(route.t, ramp, rate).rampTo(route.t + lengthS - ramp, ramp, 0);
}

function flight(
  course: Course,
  initialYaw: number,
  coning: { angleRad: number; hz: number },
  vibration: { accelerationMPerS2: number; hz: number },
): Motion {
  const n = newProfilePoint();
  const e = newProfilePoint();
  const w = newProfilePoint();
  const r = newProfilePoint();
  const air = newProfilePoint();
  const cone = 2 * Math.PI * coning.hz;
  const shake = 2 * Math.PI * vibration.hz;
  const shakeSpeed = vibration.accelerationMPerS2 / shake;
  const evaluate = (t: number, out: Kinematics) => {
    course.north.at(t, n);
    course.east.at(t, e);
    course.climb.at(t, w);
    course.turnRate.at(t, r);
    course.airborne.at(t, air);
    tilt(n, e, r, initialYaw, air, out);
    const cs = sin(cone * t);
    const cc = cos(cone * t);
    out.roll += coning.angleRad * air.value * cs;
    out.rollRate += coning.angleRad * (air.rate * cs + air.value * cone * cc);
    out.pitch += coning.angleRad * air.value * cc;
    out.pitchRate += coning.angleRad * (air.rate * cc - air.value * cone * cs);
    // Shaking along all three axes, out of step with one another.
    const s1 = sin(shake * t);
    const c1 = cos(shake * t);
    const v = shakeSpeed * air.value;
    const dv = shakeSpeed * air.rate;
    out.vn = n.value + 0.4 * v * s1;
    out.an = n.rate + 0.4 * (dv * s1 + v * shake * c1);
    out.ve = e.value + 0.4 * v * c1;
    out.ae = e.rate + 0.4 * (dv * c1 - v * shake * s1);
    out.vd = -w.value + v * s1;
    out.ad = -w.rate + dv * s1 + v * shake * c1;
  };
  const bandwidthHz = max(
    2,
    coning.angleRad > 0 ? coning.hz : 0,
    vibration.accelerationMPerS2 > 0 ? vibration.hz : 0,
  );
  return { kind: 'multirotor', evaluate, bandwidthHz };
}

type Point = ReturnType<typeof newProfilePoint>;

/** Tilt that carries the horizontal acceleration and drag: pitch = −atan(forward ÷ g), roll = atan(right ÷ g). */
function tilt(n: Point, e: Point, r: Point, initialYaw: number, air: Point, out: Kinematics): void {
  const yaw = initialYaw + r.integral;
  const c = cos(yaw);
  const s = sin(yaw);
  const pushN = n.rate + DRAG * n.value;
  const pushE = e.rate + DRAG * e.value;
  const pushNRate = n.curve + DRAG * n.rate;
  const pushERate = e.curve + DRAG * e.rate;
  const forward = (c * pushN + s * pushE) / STANDARD_GRAVITY_M_S2;
  const right = (-s * pushN + c * pushE) / STANDARD_GRAVITY_M_S2;
  const forwardRate = (c * pushNRate + s * pushERate) / STANDARD_GRAVITY_M_S2 + r.value * right;
  const rightRate = (-s * pushNRate + c * pushERate) / STANDARD_GRAVITY_M_S2 - r.value * forward;
  // On the ground it stands a little askew.
  const ground = 1 - air.value;
  out.yaw = yaw;
  out.yawRate = r.value;
  out.pitch = GROUND_PITCH * ground - atan(forward);
  out.pitchRate = -GROUND_PITCH * air.rate - forwardRate / (1 + forward * forward);
  out.roll = GROUND_ROLL * ground + atan(right);
  out.rollRate = -GROUND_ROLL * air.rate + rightRate / (1 + right * right);
}
