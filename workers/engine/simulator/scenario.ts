/** A whole recording out of a scenario: motion, IMU, GNSS, truth. */
import { degToRad } from '@/shared/units';
import type { ImuGrade, Scenario } from '@/shared/contracts/scenarios';
import { createRandom, type RandomSource } from '../random';
import { EngineError, type ImuSampling, type RecordingColumns } from '../types';
import { simulateAids, type AidErrors, type SimulatedAids } from './aid-sensors';
import { IMU_GRADES, type ImuModel } from './grades';
import { simulateGnss, type GnssOptions, type SimulatedGnss } from './gnss';
import { senseImu, type SensedImu } from './imu-errors';
import { inverseMechanisation, type Place } from './inverse';
import type { Motion, MotionOptions } from './motion';
import { crawlerMotion } from './motions/crawler';
import { fixedWingMotion } from './motions/fixed-wing';
import { multirotorMotion } from './motions/multirotor';
import { roadMotion } from './motions/road';
import { staticMotion } from './motions/static';

/** 6 h at 200 Hz and a little more: about 1 GB of columns. */
export const MAX_SAMPLES = 5e6;

/** What a scenario does not name; left out, each takes its plain value. */
export interface ScenarioExtras {
  sampling?: ImuSampling;
  /** In the place of the one that the scenario's seed would give. */
  motion?: Motion;
  /** Finer sensor errors: scale factors, range, steps. */
  imu?: Partial<ImuModel>;
  gnss?: Partial<GnssOptions>;
  /** Sensors besides IMU and GNSS. */
  aids?: AidErrors;
}

/** A simulated recording with all that is known of how it came about. */
export interface SimulatedRecording extends RecordingColumns {
  reference: NonNullable<RecordingColumns['reference']>;
  gyroBias: SensedImu['gyroBias'];
  accelBias: SensedImu['accelBias'];
  gyroScale: SensedImu['gyroScale'];
  accelScale: SensedImu['accelScale'];
  antenna: SimulatedGnss['truth'];
  outlier: SimulatedGnss['outlier'];
  /** True offset of the barometer at its readings, m. */
  barometerBias: SimulatedAids['barometerBias'];
}

/**
 * The recording of a scenario: IMU samples as mean rates, GNSS at the antenna, exact truth at the IMU's origin at every
 * IMU epoch. Time begins at 0. The same scenario gives the same numbers.
 * @throws EngineError 'latitude' when the track comes too near a pole, 'too-long' above MAX_SAMPLES.
 */
export function simulateScenario(scenario: Scenario, extras: ScenarioExtras = {}): SimulatedRecording {
  const samples = scenario.durationS * scenario.imuRateHz;
  if (samples > MAX_SAMPLES)
    throw new EngineError(
      'too-long',
      `${scenario.durationS} s at ${scenario.imuRateHz} Hz are ${(samples / 1e6).toFixed(1)} million samples; at most ${MAX_SAMPLES / 1e6} million are simulated. Shorten durationS or lower imuRateHz.`,
    );
  const random = createRandom(scenario.seed);
  const motion = extras.motion ?? scenarioMotion(scenario, random.split('motion'));
  const start: Place = {
    latRad: degToRad(scenario.origin.latDeg),
    lonRad: degToRad(scenario.origin.lonDeg),
    heightM: scenario.origin.heightM,
  };
  const timeS = regularTimes(scenario.durationS, scenario.imuRateHz);
  const { imu: perfect, truth } = inverseMechanisation(motion, start, timeS, extras.sampling);
  const model = { ...imuModel(scenario.imuGrade, scenario.imuErrors), ...extras.imu };
  const sensed = senseImu(perfect, model, random.split('imu'));
  const gnssOptions: GnssOptions = {
    ...scenario.gnss,
    rateHz: scenario.gnssRateHz,
    leverArmM: scenario.leverArmM,
    ...extras.gnss,
  };
  const gnss = simulateGnss(motion, start, 0, timeS[timeS.length - 1]!, gnssOptions, random.split('gnss'));
  const aids = extras.aids
    ? simulateAids(motion, start, 0, timeS[timeS.length - 1]!, extras.aids, random.split('aids'))
    : { aids: null, barometerBias: new Float64Array(0) };
  return {
    ...aids,
    imu: sensed.imu,
    gnss: gnss.gnss,
    reference: truth,
    gyroBias: sensed.gyroBias,
    accelBias: sensed.accelBias,
    gyroScale: sensed.gyroScale,
    accelScale: sensed.accelScale,
    antenna: gnss.truth,
    outlier: gnss.outlier,
  };
}

/** A grade's errors with the named ones replaced. */
export function imuModel(grade: ImuGrade, errors: Scenario['imuErrors'] = {}): ImuModel {
  const given = Object.entries(errors).filter(([, value]) => value !== undefined);
  return { ...IMU_GRADES[grade], ...Object.fromEntries(given) };
}

/** The motion that a scenario names. */
export function scenarioMotion(scenario: Scenario, random: RandomSource): Motion {
  const options: MotionOptions = {
    durationS: scenario.durationS,
    staticStartS: scenario.staticStartS,
    initialHeadingRad: degToRad(scenario.initialHeadingDeg),
    random,
  };
  switch (scenario.motion) {
    case 'road':
      return roadMotion(options);
    case 'crawler':
      return crawlerMotion(options);
    case 'fixed-wing':
      return fixedWingMotion(options);
    case 'multirotor':
      return multirotorMotion(options);
    case 'static':
      return staticMotion(options.initialHeadingRad);
  }
}

/** 0, 1/rate, 2/rate … up to the duration, s. */
export function regularTimes(durationS: number, rateHz: number): Float64Array {
  const count = Math.floor(durationS * rateHz + 1e-6) + 1;
  return Float64Array.from({ length: count }, (_, k) => k / rateHz);
}
