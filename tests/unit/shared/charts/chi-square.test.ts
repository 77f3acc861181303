import { nisBounds95, radius95OverDrms } from '@/shared/charts/model/chi-square';

/** Lower incomplete gamma of χ² with 1, 2, 3 degrees, closed forms by the error function (Abramowitz & Stegun 26.4). */
function chiSquareBelow(x: number, degrees: number): number {
  if (degrees === 2) return 1 - Math.exp(-x / 2);
  const one = erf(Math.sqrt(x / 2));
  return degrees === 1 ? one : one - Math.sqrt((2 * x) / Math.PI) * Math.exp(-x / 2);
}

/** By its series; enough for |x| < 4. */
function erf(x: number): number {
  let [term, sum] = [x, x];
  for (let n = 1; n < 80; n++) {
    term *= -(x * x) / n;
    sum += term / (2 * n + 1);
  }
  return (2 / Math.sqrt(Math.PI)) * sum;
}

it.each([1, 2, 3])('95 %% of single NIS with %d degrees of freedom lie between the bounds', (degrees) => {
  const [low, high] = nisBounds95(degrees);
  expect(chiSquareBelow(low, degrees)).toBeCloseTo(0.025, 4);
  expect(chiSquareBelow(high, degrees)).toBeCloseTo(0.975, 4);
});

it.each([0, 0.25, 0.5, 0.75, 1])(
  '95 %% of a plane error with axes 1 and %f lie inside the radius',
  (ratio) => {
    const radius = radius95OverDrms(ratio) * Math.hypot(1, ratio);
    // Over directions u = cos²: P(|e| < r) by summing the exact radial part on a fine grid of the angle.
    const steps = 4000;
    let outside = 0;
    for (let i = 0; i < steps; i++) {
      const angle = ((i + 0.5) / steps) * 2 * Math.PI;
      const [a, b] = [Math.cos(angle), Math.sin(angle) * ratio];
      outside += Math.exp(-(radius * radius) / (2 * (a * a + b * b || 1e-300))) / steps;
    }
    expect(1 - outside).toBeCloseTo(0.95, 2);
  },
);
