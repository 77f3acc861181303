/** A survey crawler: slow legs along a quay, turned about at each end, with stops to take soundings. */
import type { Motion, MotionOptions } from '../motion';
import { RAMP_SLOPE, SmoothProfile } from '../profile';
import { groundMotion, waves } from './ground';
import { Route } from './route';

const PEAK_ACCELERATION = 0.8; // m/s²
const TURN_RATE = 0.25; // rad/s
const LEG_SHIFT_M = 3;

export function crawlerMotion(options: MotionOptions): Motion {
  const { random } = options;
  const speed = new SmoothProfile(0);
  const turnRate = new SmoothProfile(0);
  const route = new Route(options.staticStartS, options.initialHeadingRad, random, Infinity);
  let current = 0;
  const changeSpeed = (target: number) => {
    const length = Math.max((Math.abs(target - current) * RAMP_SLOPE) / PEAK_ACCELERATION, 1.5);
    speed.rampTo(route.t, length, target);
    route.advance(length, (current + target) / 2);
    current = target;
  };
  const turn = (angle: number) => {
    const ramp = 1.5;
    const hold = Math.max(Math.abs(angle) / TURN_RATE - ramp, 0.2);
    const rate = angle / (hold + ramp);
    turnRate.rampTo(route.t, ramp, rate).rampTo(route.t + ramp + hold, ramp, 0);
    route.advance(hold + 2 * ramp, current, angle);
  };
  const weave = () => {
    const angle = route.pickTurn(0.08, 0.25);
    turn(angle);
    route.advance(route.between(2, 5), current);
    turn(-angle);
  };
  let side = route.chance(0.5) ? 1 : -1;
  while (route.t < options.durationS + 1) {
    changeSpeed(route.between(2.4, 3));
    const stops = 1 + Math.floor(route.between(0, 3));
    for (let i = 0; i < stops; i += 1) {
      route.advance(route.between(8, 18), current);
      if (route.chance(0.7)) weave();
      changeSpeed(0);
      route.advance(route.between(6, 20), 0);
      changeSpeed(route.between(2, 3));
    }
    route.advance(route.between(6, 14), current);
    changeSpeed(1.2);
    turn((side * Math.PI) / 2);
    route.advance(LEG_SHIFT_M / current, current);
    turn((side * Math.PI) / 2);
    side = -side;
  }
  return groundMotion({
    kind: 'crawler',
    speed,
    turnRate,
    initialCourse: options.initialHeadingRad,
    slope: waves(random, [0.006, 60], [0.004, 7]),
    crossfall: waves(random, [0.008, 23], [0.005, 4]),
    squat: 0.012,
    lean: 0.01,
    rockPerSpeed: 8e-4,
    rockHz: 2.1,
  });
}
