import type { ParametersInput } from '@/shared/contracts/parameters';
import type { ScenarioInput } from '@/shared/contracts/scenarios';
import { degToRad, radToDeg } from '@/shared/units';
import { align, type Alignment } from '@/workers/engine/alignment/align';
import { prepareFixes } from '@/workers/engine/filter/fixes';
import { ACCEL_BIAS, ATTITUDE, GYRO_BIAS, STATES } from '@/workers/engine/filter/states';
import { wrapAngle } from '@/workers/engine/geodesy';
import { NAV_GYRO_BIAS } from '@/workers/engine/strapdown/navigation-state';
import { EngineError } from '@/workers/engine';
import { simulateCase, type SimulatedCase } from '../support/monte-carlo';

jest.setTimeout(30_000); // simulations, many of them

const road = (seed: number, more: ScenarioInput = {}, parameters: ParametersInput = {}) =>
  simulateCase({ motion: 'road', durationS: 45, imuRateHz: 25, staticStartS: 15, seed, ...more }, parameters);

function alignCase({ recording, parameters, scenario }: SimulatedCase): Alignment {
  return align(recording.imu, prepareFixes(recording.gnss, parameters.gnss), parameters, scenario.leverArmM);
}

/** roll, pitch, yaw of the alignment less the truth's there, in σ. */
function attitudeErrors(simulated: SimulatedCase): number[] {
  const { report, sample } = alignCase(simulated);
  return simulated.recording.reference.attitude.map((column, i) => {
    const error = radToDeg(wrapAngle(degToRad(report.attitudeDeg[i]!) - column[sample]!));
    return error / report.attitudeSigmaDeg[i]!;
  });
}

const rms = (x: number[]) => Math.sqrt(x.reduce((sum, v) => sum + v * v, 0) / x.length);

describe('standing first, then driving', () => {
  test('levels at rest, takes the heading from GNSS and starts at the first sample', () => {
    const { sample, report } = alignCase(road(1));
    expect(sample).toBe(0);
    expect(report.levelling).toBe('static');
    expect(report.heading).toBe('course');
    expect(report.sentence).toMatch(/^Levelled over 1[45]\.\d s at rest; heading from GNSS .*carried back/);
  });

  test.each([
    ['road', { motion: 'road' }, {}],
    ['crawler', { motion: 'crawler' }, {}],
    ['a multirotor that flies sideways', { motion: 'multirotor', durationS: 75 }, {}],
    ['road without GNSS velocity', { motion: 'road' }, { gnss: { useVelocity: false } }],
  ] as [string, ScenarioInput, ParametersInput][])(
    'errors are what σ says: %s',
    (_name, scenario, parameters) => {
      const errors = Array.from({ length: 12 }, (_, i) =>
        attitudeErrors(road(100 + i, scenario, parameters)),
      );
      for (const axis of [0, 1, 2]) {
        const size = rms(errors.map((e) => e[axis]!));
        expect(size).toBeGreaterThan(0.25); // not hiding behind a wide σ
        expect(size).toBeLessThan(1.45); // 12 draws: 1.44 at 99.8 %
      }
    },
  );

  test('a tilt is the accelerometer bias over gravity, and the covariance knows it', () => {
    const { p } = alignCase(road(2));
    const at = (i: number, j: number) =>
      p[i * STATES + j]! / Math.sqrt(p[i * (STATES + 1)]! * p[j * (STATES + 1)]!);
    const north = Math.hypot(at(ATTITUDE, ACCEL_BIAS), at(ATTITUDE, ACCEL_BIAS + 1));
    expect(north).toBeGreaterThan(0.99);
    expect(Math.sqrt(p[ATTITUDE * (STATES + 1)]!) * 9.8).toBeCloseTo(0.05, 3);
  });

  test('reads the gyro bias off the rest', () => {
    const simulated = road(3);
    const { nav, p, sample } = alignCase(simulated);
    for (const axis of [0, 1, 2] as const) {
      const error = nav[NAV_GYRO_BIAS + axis]! - simulated.recording.gyroBias[axis][sample]!;
      const sigma = Math.sqrt(p[(GYRO_BIAS + axis) * (STATES + 1)]!);
      expect(sigma).toBeLessThan(1e-4); // of 3.5e-3 at turn-on
      expect(Math.abs(error) / sigma).toBeLessThan(4);
    }
  });

  test('outliers among the fixes do not turn the start', () => {
    for (const seed of [1, 2, 3, 4, 5, 6]) {
      const errors = attitudeErrors(road(seed, { gnss: { outlierShare: 0.05, outlierSigmas: 50 } }));
      expect(Math.abs(errors[2]!)).toBeLessThan(4);
    }
  });

  test('a standstill that began before GNSS counts', () => {
    const simulated = road(4);
    const { gnss } = simulated.recording;
    const late = gnss.timeS.findIndex((t) => t > 9);
    gnss.latRad.fill(NaN, 0, late);
    const { sample, report } = alignCase(simulated);
    expect(sample).toBe(0);
    expect(report.levelling).toBe('static');
  });
});

describe('moving from the first sample', () => {
  test('levels against GNSS acceleration, heading from course', () => {
    const results = Array.from({ length: 12 }, (_, i) => {
      const simulated = road(200 + i);
      const { imu, gnss } = simulated.recording;
      const k = imu.timeS.findIndex((t) => t >= 25);
      simulated.parameters.initial.timeS = imu.timeS[k]!;
      expect(gnss.timeS.length).toBeGreaterThan(0);
      const { report } = alignCase(simulated);
      expect(report.levelling).toBe('moving');
      expect(report.timeS).toBeGreaterThanOrEqual(25);
      return attitudeErrors(simulated);
    });
    for (const axis of [0, 1, 2]) expect(rms(results.map((e) => e[axis]!))).toBeLessThan(1.7);
  });
});

describe('what is given is used as it stands', () => {
  test('the whole state with its σ', () => {
    const given = road(
      5,
      {},
      {
        initial: {
          timeS: 3,
          position: { latDeg: 47.3, lonDeg: -14.5, heightM: 12 },
          velocityNedMPerS: [1, 2, 3],
          attitude: { rollDeg: 1, pitchDeg: 2, yawDeg: 3 },
          positionSigmaNedM: [4, 5, 6],
          velocitySigmaNedMPerS: [0.4, 0.5, 0.6],
          attitudeSigmaDeg: [1, 2, 10],
          gyroBiasRadPerS: [0.01, 0.02, 0.03],
          accelBiasMPerS2: [0.1, 0.2, 0.3],
        },
      },
    );
    const { nav, p, report } = alignCase(given);
    expect(report).toMatchObject({ timeS: 3, levelling: 'given', heading: 'given' });
    expect([radToDeg(nav[0]!), radToDeg(nav[1]!), nav[2]]).toEqual([
      expect.closeTo(47.3, 10),
      expect.closeTo(-14.5, 10),
      12,
    ]);
    expect([...nav.slice(3, 6)]).toEqual([1, 2, 3]);
    expect([...nav.slice(10, 16)]).toEqual([0.01, 0.02, 0.03, 0.1, 0.2, 0.3]);
    expect(report.attitudeDeg.map((x) => Number(x.toFixed(9)))).toEqual([1, 2, 3]);
    report.attitudeSigmaDeg.forEach((s, i) => expect(s).toBeCloseTo([1, 2, 10][i]!, 6));
    [4, 5, 6, 0.4, 0.5, 0.6].forEach((s, i) => expect(Math.sqrt(p[i * (STATES + 1)]!)).toBeCloseTo(s, 12));
  });

  test('heading alone: levelled at rest, heading as given', () => {
    const { report } = alignCase(
      road(6, {}, { initial: { headingDeg: -120, attitudeSigmaDeg: [1, 1, 15] } }),
    );
    expect(report).toMatchObject({ levelling: 'static', heading: 'given' });
    expect(report.attitudeDeg[2]).toBeCloseTo(-120, 9);
    expect(report.attitudeSigmaDeg[2]).toBeCloseTo(15, 2);
  });
});

describe('what is missing is said', () => {
  const failure = (simulated: SimulatedCase) => {
    try {
      alignCase(simulated);
    } catch (error) {
      if (error instanceof EngineError) return error.code;
      throw error;
    }
    return 'none';
  };

  test('no heading, no overlap, start after the end', () => {
    expect(failure(road(7, { motion: 'static' }))).toBe('no-heading');
    expect(failure(road(8, {}, { initial: { timeS: 1e4 } }))).toBe('no-overlap');
    const beyond = road(
      9,
      {},
      { initial: { timeS: 1e4, position: { latDeg: 47, lonDeg: -14, heightM: 0 } } },
    );
    expect(failure(beyond)).toBe('nothing-to-filter');
  });
});
