import { scenarioSchema, type ScenarioInput } from '@/shared/contracts/scenarios';
import { simulateScenario } from '@/workers/engine/simulator/scenario';

const make = (input: ScenarioInput) =>
  simulateScenario(scenarioSchema.parse({ durationS: 60, staticStartS: 5, ...input }));

test.each(['road', 'crawler', 'fixed-wing', 'multirotor', 'static'] as const)(
  '%s: complete columns of one length, finite, truth at every IMU epoch',
  (motion) => {
    const recording = make({ motion });
    const n = 60 * 100 + 1;
    const { imu, gnss, reference } = recording;
    expect(imu.timeS[0]).toBe(0);
    expect(imu.timeS[n - 1]).toBe(60);
    expect(imu.sampling).toBe('mean-rate');
    expect(reference.timeS).toEqual(imu.timeS);
    const columns = [
      ...imu.gyro,
      ...imu.accel,
      reference.latRad,
      ...reference.attitude,
      ...recording.gyroBias,
    ];
    for (const column of columns) {
      expect(column.length).toBe(n);
      expect(column.every(Number.isFinite)).toBe(true);
    }
    expect(gnss.timeS.length).toBe(60 * 5 + 1);
    for (const column of [gnss.latRad, gnss.lonRad, gnss.heightM, ...gnss.velocityNed])
      expect(column.every(Number.isFinite)).toBe(true);
  },
);

test('the same scenario gives the same numbers; another seed gives another drive and other errors', () => {
  expect(make({ seed: 3 })).toEqual(make({ seed: 3 }));
  expect(make({ seed: 3 }).imu.gyro[0]).not.toEqual(make({ seed: 4 }).imu.gyro[0]);
});

test('the IMU grade changes the sensor alone: the drive and the fixes stay', () => {
  const [a, b] = [make({ imuGrade: 'consumer' }), make({ imuGrade: 'navigation' })];
  expect(a.reference).toEqual(b.reference);
  expect(a.gnss).toEqual(b.gnss);
  expect(a.imu.gyro[0]).not.toEqual(b.imu.gyro[0]);
});

test('it starts where, and pointing where, the scenario says', () => {
  const { reference } = make({
    origin: { latDeg: -12, lonDeg: 179.999, heightM: 7 },
    initialHeadingDeg: 270,
  });
  expect(reference.latRad[0]).toBeCloseTo((-12 * Math.PI) / 180, 14);
  expect(reference.heightM[0]).toBe(7);
  expect(reference.attitude[2][0]).toBeCloseTo(-Math.PI / 2, 12);
});

test('across the antimeridian the longitude wraps', () => {
  const { reference, gnss } = make({
    motion: 'fixed-wing',
    staticStartS: 0,
    origin: { latDeg: 10, lonDeg: 179.999, heightM: 500 },
    initialHeadingDeg: 90,
  });
  const last = reference.lonRad[reference.lonRad.length - 1]!;
  expect(last).toBeLessThan(-3);
  expect(Math.max(...gnss.lonRad.map(Math.abs))).toBeLessThanOrEqual(Math.PI);
});

test('more samples than memory should hold are refused, with what to change', () => {
  expect(() => make({ durationS: 36_000, imuRateHz: 1000 })).toThrow(
    /36000 s at 1000 Hz are 36.0 million samples; at most 5 million .* Shorten durationS or lower imuRateHz/,
  );
});
