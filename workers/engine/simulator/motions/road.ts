/** A road vehicle: starts, bends, junctions, speed changes and stops, on a hilly road. */
import type { Motion, MotionOptions } from '../motion';
import { RAMP_SLOPE, SmoothProfile } from '../profile';
import { groundMotion, waves } from './ground';
import { Route } from './route';

const PEAK_ACCELERATION = 2.4; // m/s²
const PEAK_SIDEWAYS = 2.5; // m/s²

export function roadMotion(options: MotionOptions): Motion {
  const { random } = options;
  const speed = new SmoothProfile(0);
  const turnRate = new SmoothProfile(0);
  const route = new Route(options.staticStartS, options.initialHeadingRad, random, 2500);
  let current = 0;
  const changeSpeed = (target: number) => {
    const length = Math.max((Math.abs(target - current) * RAMP_SLOPE) / PEAK_ACCELERATION, 2);
    speed.rampTo(route.t, length, target);
    route.advance(length, (current + target) / 2);
    current = target;
  };
  const turn = (angle: number) => {
    const ramp = 1.2;
    const most = Math.min(PEAK_SIDEWAYS / current, 0.5);
    const hold = Math.max(Math.abs(angle) / most - ramp, 0.3);
    const rate = angle / (hold + ramp);
    turnRate.rampTo(route.t, ramp, rate).rampTo(route.t + ramp + hold, ramp, 0);
    route.advance(hold + 2 * ramp, current, angle);
  };
  while (route.t < options.durationS + 1) {
    changeSpeed(route.between(9, 22));
    const bends = 2 + Math.floor(route.between(0, 4));
    for (let i = 0; i < bends; i += 1) {
      route.advance(route.between(3, 9), current);
      turn(route.chance(0.4) ? route.pickTurn(1.2, 1.9) : route.pickTurn(0.2, 0.8));
      if (route.chance(0.4)) changeSpeed(route.between(8, 22));
    }
    route.advance(route.between(2, 5), current);
    changeSpeed(0);
    route.advance(route.between(3, 12), 0);
  }
  return groundMotion({
    kind: 'road',
    speed,
    turnRate,
    initialCourse: options.initialHeadingRad,
    slope: waves(random, [0.025, 900], [0.012, 230]),
    crossfall: waves(random, [0.012, 310]),
    squat: 0.006,
    lean: 0.008,
    rockPerSpeed: 1.5e-4,
    rockHz: 1.3,
  });
}
