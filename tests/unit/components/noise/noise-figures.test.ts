import { allanCurves, datasheetCurve } from '@/components/noise/allan-content';
import { startValues } from '@/components/noise/start-values';
import { shownFigure, SENSORS } from '@/components/noise/sensors';
import type { NoiseAnalysis } from '@/shared/contracts/noise';
import { sensorFiguresSchema } from '@/shared/contracts/vehicles';
import { RAD_PER_DEG } from '@/shared/units';

const figures = sensorFiguresSchema.parse({
  gyro: {
    whiteNoiseRadPerSqrtS: (0.3 * RAD_PER_DEG) / 60,
    biasInstabilityRadPerS: (10 * RAD_PER_DEG) / 3600,
  },
  accel: { whiteNoiseMPerSPerSqrtS: 1e-3, turnOnBiasSigmaMPerS2: 99 },
});

test('figures are shown in the units of the trade', () => {
  const [white, wander] = SENSORS.gyro.figures;
  expect(shownFigure(figures, 'gyro', white!)).toBeCloseTo(0.3, 12); // °/√h
  expect(shownFigure(figures, 'gyro', wander!)).toBeCloseTo(10, 12); // °/h
  expect(shownFigure(null, 'gyro', white!)).toBeNull();
});

test('known figures become start values; what the filter would refuse stays out', () => {
  expect(startValues(figures).map(({ path }) => path)).toEqual([
    'gyro.whiteNoiseRadPerSqrtS',
    'gyro.biasInstabilityRadPerS',
    'accel.whiteNoiseMPerSPerSqrtS',
  ]);
});

test('the datasheet’s curve: N/√τ at short times, 0.664 B at long ones (IEEE Std 952)', () => {
  const curve = datasheetCurve(figures, 'gyro', [0.01, 1e6])!;
  // 0.3 °/√h at 1 s is 18 °/h.
  expect(curve[0]!.deviation).toBeCloseTo(180, 0);
  expect(curve.at(-1)!.deviation / (0.6643 * 10)).toBeCloseTo(1, 3);
  expect(datasheetCurve(sensorFiguresSchema.parse({}), 'gyro', [1, 10])).toBeNull();
});

test('curves are drawn in °/h and mg', () => {
  const point = { tauS: 1, deviation: 9.80665e-3, low: 9e-3, high: 1e-2, model: 1e-2 };
  const term = { value: null, sigma: null };
  const terms = { quantisation: term, white: term, biasInstability: term, rateRandomWalk: term, ramp: term };
  const analysis = {
    axes: [
      { channel: 'gyro_x', unit: 'rad/s', points: [{ ...point, deviation: RAD_PER_DEG / 3600 }], terms },
      { channel: 'accel_y', unit: 'm/s²', points: [point], terms },
    ],
  } as unknown as NoiseAnalysis;
  expect(allanCurves(analysis, 'gyro')[0]!.points[0]!.deviation).toBeCloseTo(1, 12);
  expect(allanCurves(analysis, 'accel')[0]).toMatchObject({ axis: 'y' });
  expect(allanCurves(analysis, 'accel')[0]!.points[0]!.deviation).toBeCloseTo(1, 12);
});
