/** Gaps, recoveries, aids between samples and smoothing, with every optional state carried. */
import { createRun } from '@/workers/engine';
import { requestOf, simulateCase } from '../support/monte-carlo';

test('a gap, fixes that jump and come back, and the smoother over all of it', () => {
  const simulated = simulateCase(
    { motion: 'road', durationS: 200, imuRateHz: 50, staticStartS: 20, seed: 31, leverArmM: [0.5, -0.2, -1] },
    {
      states: {
        gyroScale: { enabled: true },
        accelScale: { enabled: true },
        leverArm: { enabled: true },
        barometerBias: { enabled: true },
      },
      aids: { barometer: { enabled: true }, odometer: { enabled: true } },
    },
    {
      aids: {
        barometer: { rateHz: 5, phaseS: 0.011, sigmaM: 0.5, offsetSigmaM: 10 },
        odometer: { rateHz: 5, phaseS: 0.003, sigmaMPerS: 0.1 },
      },
    },
  );
  const { imu, gnss } = simulated.recording;
  const keep = [...imu.timeS.keys()].filter((k) => imu.timeS[k]! <= 60 || imu.timeS[k]! > 60.6);
  const pick = (column: Float64Array) => Float64Array.from(keep, (k) => column[k]!);
  const three = (axes: typeof imu.gyro) => [pick(axes[0]), pick(axes[1]), pick(axes[2])] as const;
  simulated.recording.imu = {
    ...imu,
    timeS: pick(imu.timeS),
    gyro: three(imu.gyro),
    accel: three(imu.accel),
  };
  // 300 m north for 15 s: longer than the filter holds against it.
  gnss.timeS.forEach((t, j) => {
    if (t >= 90 && t < 105) gnss.latRad[j] = gnss.latRad[j]! + 300 / 6.37e6;
  });
  const run = createRun(simulated.recording, requestOf(simulated, { smooth: true, errorBudget: true }));
  while (!run.advance(1e6));
  const { solution, smoothed, summary } = run.finish();
  const codes = summary.warnings.map((w) => w.code);
  expect(codes).toEqual(expect.arrayContaining(['gap-bridged', 'position-reinitialised']));
  for (const table of [solution, smoothed!])
    for (const [name, column] of Object.entries(table)) {
      expect(column.every(Number.isFinite)).toBe(true);
      if (name.startsWith('sigma_')) expect(Math.min(...column)).toBeGreaterThan(0);
    }
  // Back among good fixes the end is as good as any.
  const end = solution.time_s!.length - 1;
  const { reference } = simulated.recording;
  const at = reference.timeS.length - 1;
  const north = ((solution.lat_deg![end]! * Math.PI) / 180 - reference.latRad[at]!) * 6.37e6;
  expect(Math.abs(north)).toBeLessThan(4 * solution.sigma_n_m![end]!);
  const bias = summary.optionalStates!.find((s) => s.name === 'barometer_bias_m')!;
  expect(Math.abs(bias.value - simulated.recording.barometerBias.at(-1)!)).toBeLessThan(4 * bias.sigma);
});
