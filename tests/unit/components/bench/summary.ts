/** A run's summary for tests: plausible figures, every part can be replaced. */
import type { DriftPoint, OutageResult, RunSummary } from '@/shared/contracts/runs';

export const driftPoint = (
  afterS: number,
  horizontalM: number,
  predictedHorizontalM: number,
): DriftPoint => ({
  afterS,
  horizontalM,
  verticalM: 1,
  velocityMPerS: 0.2,
  headingDeg: 0.4,
  predictedHorizontalM,
  predictedVerticalM: 1,
});
export const outage = (startS: number, points: DriftPoint[]): OutageResult => ({
  startS,
  endS: startS + points[points.length - 1]!.afterS,
  withhold: 'gnss',
  reference: 'truth',
  points,
});

export function makeSummary(change: Partial<RunSummary> = {}): RunSummary {
  const state = {
    positionM: [0.5, 0.5, 0.9],
    velocityMPerS: [0.05, 0.05, 0.07],
    attitudeDeg: [0.2, 0.2, 0.8],
    gyroBiasRadPerS: [1e-5, 1e-5, 2e-5],
    accelBiasMPerS2: [0.01, 0.01, 0.005],
  } satisfies RunSummary['finalSigma'];
  return {
    engineVersion: '0.1.0',
    startS: 0,
    endS: 1200,
    durationS: 1200,
    imuSamples: 120_000,
    computeS: 0.28,
    alignment: {
      timeS: 30,
      levelling: 'static',
      heading: 'course',
      sentence: '',
      attitudeDeg: [0, 0, 35],
      attitudeSigmaDeg: [0.2, 0.2, 3],
    },
    channels: [
      {
        channel: 'position north',
        unit: 'm',
        used: 5900,
        rejected: 5,
        mean: 0,
        sigmaRatio: 1,
        lag1: 0.01,
        lag1Band: 0.026,
      },
      {
        channel: 'velocity east',
        unit: 'm/s',
        used: 5900,
        rejected: 3,
        mean: 0,
        sigmaRatio: 1,
        lag1: -0.06,
        lag1Band: 0.026,
      },
    ],
    groups: [
      {
        group: 'position',
        dimension: 3,
        used: 5900,
        rejected: 5,
        nisMean: 2.96,
        nisBounds: [2.94, 3.06],
        insideShare: 0.95,
      },
      {
        group: 'velocity',
        dimension: 3,
        used: 5900,
        rejected: 3,
        nisMean: 1.41,
        nisBounds: [2.94, 3.06],
        insideShare: 0.99,
      },
    ],
    outages: [],
    finalSigma: state,
    meanSigma: state,
    gyroBiasRadPerS: [1e-4, 0, 0],
    accelBiasMPerS2: [0.05, 0, 0],
    truth: null,
    findings: [],
    warnings: [],
    ...change,
  };
}
