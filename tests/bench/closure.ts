/** Prints how well the strapdown closes on noise-free analytic motions: `npm run bench -- closure`. */
import { degToRad } from '@/shared/units';
import { createRandom } from '@/workers/engine/random';
import type { Motion, MotionOptions } from '@/workers/engine/simulator/motion';
import { crawlerMotion } from '@/workers/engine/simulator/motions/crawler';
import { fixedWingMotion } from '@/workers/engine/simulator/motions/fixed-wing';
import { multirotorMotion } from '@/workers/engine/simulator/motions/multirotor';
import { roadMotion } from '@/workers/engine/simulator/motions/road';
import { closure } from '@/tests/support/closure';

const options = (seed: number, durationS: number, staticStartS: number): MotionOptions => ({
  durationS,
  staticStartS,
  initialHeadingRad: 0.6,
  random: createRandom(seed),
});
const calm = { accelerationMPerS2: 0, hz: 27 };
const coning = (seed: number, halfAngleDeg: number) =>
  multirotorMotion({
    ...options(seed, 400, 5),
    vibration: calm,
    coning: { angleRad: degToRad(halfAngleDeg), hz: 3 },
  });
const cases: [string, number, (seed: number) => Motion][] = [
  ['road', 600, (seed) => roadMotion(options(seed, 600, 10))],
  ['crawler', 600, (seed) => crawlerMotion(options(seed, 600, 10))],
  ['fixed wing', 600, (seed) => fixedWingMotion(options(seed, 600, 0))],
  ['multirotor', 400, (seed) => multirotorMotion({ ...options(seed, 400, 5), vibration: calm })],
  ['multirotor, 0.5° coning at 3 Hz', 400, (seed) => coning(seed, 0.5)],
  ['multirotor, 1° coning at 3 Hz', 400, (seed) => coning(seed, 1)],
  ['multirotor, 2° coning at 3 Hz', 400, (seed) => coning(seed, 2)],
  ['multirotor, shaking at 27 Hz', 400, (seed) => multirotorMotion(options(seed, 400, 5))],
];

console.log('Largest error over the run, mm and µrad, 3 seeds each; 200 Hz mean rates.\n');
console.log(`${'motion'.padEnd(40)}coning and sculling      trapezoidal            rectangular`);
for (const [name, durationS, make] of cases) {
  for (const seed of [1, 2, 3]) {
    const cells = (['coning-sculling', 'trapezoidal', 'rectangular'] as const).map((scheme) => {
      const { positionM, attitudeRad } = closure(make(seed), durationS, 200, scheme);
      return `${(1e3 * positionM).toFixed(3)} mm ${(1e6 * attitudeRad).toFixed(3)} µrad`.padEnd(25);
    });
    console.log(`${`${name}, ${durationS} s`.padEnd(40)}${cells.join('')}`);
  }
}

const x = (2 * Math.PI * 3) / 200;
console.log(`
Coning at 3 Hz and 200 Hz, theory (Miller 1983): uncorrected drift a²Ωx²/12, corrected a²Ωx⁴/60: ratio 5/x² = ${(5 / (x * x)).toFixed(0)}.`);
