import { scenarioSchema } from '@/shared/contracts/scenarios';
import { dcmFromQuat, quatFromEuler, quatMultiply, rotationVectorFromQuat } from '@/workers/engine/attitude';
import { wrapAngle } from '@/workers/engine/geodesy';
import { type emptyReference, ReferenceReader } from '@/workers/engine/run/reference';
import { simulateScenario } from '@/workers/engine/simulator/scenario';

const scenario = scenarioSchema.parse({ motion: 'fixed-wing', durationS: 300, imuRateHz: 50, seed: 12 });
const recording = simulateScenario(scenario, {
  aids: {
    barometer: { rateHz: 5, phaseS: 0.013, sigmaM: 0.4, offsetSigmaM: 20, walkMPerSqrtS: 0.2 },
    heading: { rateHz: 5, phaseS: 0.004, sigmaRad: 0.03 },
    odometer: { rateHz: 5, sigmaMPerS: 0.2 },
    attitude: { rateHz: 5, sigmaRad: 0.01 },
  },
});
const { barometer, heading, odometer, attitude } = recording.aids!;

/** Truth at a time between IMU samples. */
function truthAt(timeS: number) {
  const reader = new ReferenceReader(recording.reference);
  expect(reader.read(timeS)).toBe(true);
  return reader.state;
}

/** RMS over the readings, all but the last second. */
function rms(timeS: Float64Array, error: (row: number, truth: ReturnType<typeof emptyReference>) => number) {
  let sum = 0;
  let count = 0;
  timeS.forEach((t, row) => {
    if (t > 299 || row % 5 !== 0) return;
    sum += error(row, truthAt(t)) ** 2;
    count += 1;
  });
  return Math.sqrt(sum / count);
}

const yawOf = (q: Float64Array) => {
  const c = dcmFromQuat(q, new Float64Array(9));
  return Math.atan2(c[3]!, c[0]!);
};

test('readings come at their own rate and phase', () => {
  expect(barometer!.timeS[0]).toBeCloseTo(0.013, 12);
  expect(barometer!.timeS[1]! - barometer!.timeS[0]!).toBeCloseTo(0.2, 12);
  expect(barometer!.timeS.length).toBe(1500);
  expect(odometer!.timeS.length).toBe(1501);
});

test('each errs by its own σ: 300 readings, 20 %', () => {
  const sizes = {
    barometer:
      rms(barometer!.timeS, (k, t) => barometer!.heightM[k]! - t.height - recording.barometerBias[k]!) / 0.4,
    heading: rms(heading!.timeS, (k, t) => wrapAngle(heading!.headingRad[k]! - yawOf(t.quaternion))) / 0.03,
    odometer:
      rms(odometer!.timeS, (k, t) => {
        const c = dcmFromQuat(t.quaternion, new Float64Array(9));
        const [n, e, d] = t.velocity;
        return odometer!.speedMPerS[k]! - (c[0]! * n + c[3]! * e + c[6]! * d);
      }) / 0.2,
    attitude:
      rms(attitude!.timeS, (k, t) => {
        const [roll, pitch, yaw] = attitude!.attitude;
        const back = Float64Array.of(
          t.quaternion[0]!,
          -t.quaternion[1]!,
          -t.quaternion[2]!,
          -t.quaternion[3]!,
        );
        const q = quatFromEuler(roll[k]!, pitch[k]!, yaw[k]!, new Float64Array(4));
        return Math.hypot(...rotationVectorFromQuat(quatMultiply(back, q, q), new Float64Array(3)));
      }) /
      (0.01 * Math.sqrt(3)),
  };
  for (const size of Object.values(sizes)) {
    expect(size).toBeGreaterThan(0.8);
    expect(size).toBeLessThan(1.2);
  }
});

test('the barometer is off by a constant that wanders as a random walk', () => {
  const bias = recording.barometerBias;
  expect(Math.abs(bias[0]!)).toBeGreaterThan(0.1);
  let sum = 0;
  for (let k = 1; k < bias.length; k += 1) sum += (bias[k]! - bias[k - 1]!) ** 2;
  // Increments of 0.2 m/√s over 0.2 s.
  expect(Math.sqrt(sum / (bias.length - 1)) / (0.2 * Math.sqrt(0.2))).toBeCloseTo(1, 1);
});

test('other sensors leave IMU and GNSS as they are', () => {
  const plain = simulateScenario(scenario);
  expect(plain.aids).toBeNull();
  expect(plain.imu).toEqual(recording.imu);
  expect(plain.gnss).toEqual(recording.gnss);
});
