/** What can be slid on the bench: names of the trade, units, ranges, and in a line what turning it up does. */
import type { Parameters } from '@/shared/contracts/parameters';
import { QUANTITIES, type Quantity } from '@/shared/units';

export interface LogRange {
  /** SI, above zero. */
  low: number;
  high: number;
}

export type ParameterGroup = 'gyro' | 'accel' | 'gnss' | 'gate' | 'aids';

export interface SliderSpec {
  path: string;
  group: Exclude<ParameterGroup, 'aids'>;
  label: string;
  quantity: Quantity;
  range: LogRange;
  /** What turning it up does. */
  more: string;
  advanced?: boolean;
  /** Shown only while the rest of the parameters makes it count. */
  counts?: (parameters: Parameters) => boolean;
}

/** A range given in the quantity's default unit. */
const shown = (quantity: Quantity, low: number, high: number): LogRange => {
  const { toSi } = QUANTITIES[quantity][0];
  return { low: low * toSi, high: high * toSi };
};

const wanders = (model: string) => model !== 'random-walk';

export const SLIDERS: readonly SliderSpec[] = [
  {
    path: 'gyro.whiteNoiseRadPerSqrtS',
    group: 'gyro',
    label: 'White noise (ARW)',
    quantity: 'angleRandomWalk',
    range: shown('angleRandomWalk', 0.002, 20),
    more: 'more: attitude leans on GNSS sooner',
  },
  {
    path: 'gyro.biasInstabilityRadPerS',
    group: 'gyro',
    label: 'Bias instability',
    quantity: 'gyroBias',
    range: shown('gyroBias', 0.05, 500),
    more: 'more: bias follows faster, coasting σ grows',
    counts: (p) => wanders(p.gyro.biasModel),
  },
  {
    path: 'gyro.biasCorrelationTimeS',
    group: 'gyro',
    label: 'Bias correlation time',
    quantity: 'time',
    range: shown('time', 10, 20_000),
    more: 'longer: bias is held steadier',
    counts: (p) => wanders(p.gyro.biasModel),
  },
  {
    path: 'gyro.biasRandomWalkRadPerSPerSqrtS',
    group: 'gyro',
    label: 'Rate random walk K',
    quantity: 'rateRandomWalk',
    range: shown('rateRandomWalk', 0.01, 1000),
    more: 'more: bias follows faster',
    advanced: true,
    counts: (p) => !wanders(p.gyro.biasModel),
  },
  {
    path: 'gyro.turnOnBiasSigmaRadPerS',
    group: 'gyro',
    label: 'Turn-on bias σ',
    quantity: 'gyroBias',
    range: shown('gyroBias', 0.1, 20_000),
    more: 'more: the first bias estimate moves further',
    advanced: true,
    counts: (p) => p.gyro.biasModel !== 'gauss-markov',
  },
  {
    path: 'accel.whiteNoiseMPerSPerSqrtS',
    group: 'accel',
    label: 'White noise (VRW)',
    quantity: 'velocityRandomWalk',
    range: shown('velocityRandomWalk', 0.001, 20),
    more: 'more: velocity leans on GNSS sooner',
  },
  {
    path: 'accel.biasInstabilityMPerS2',
    group: 'accel',
    label: 'Bias instability',
    quantity: 'accelBias',
    range: shown('accelBias', 0.001, 20),
    more: 'more: tilt and bias follow faster',
    counts: (p) => wanders(p.accel.biasModel),
  },
  {
    path: 'accel.biasCorrelationTimeS',
    group: 'accel',
    label: 'Bias correlation time',
    quantity: 'time',
    range: shown('time', 10, 20_000),
    more: 'longer: bias is held steadier',
    counts: (p) => wanders(p.accel.biasModel),
  },
  {
    path: 'accel.biasRandomWalkMPerS2PerSqrtS',
    group: 'accel',
    label: 'Acceleration random walk K',
    quantity: 'accelRandomWalk',
    range: shown('accelRandomWalk', 0.001, 1000),
    more: 'more: bias follows faster',
    advanced: true,
    counts: (p) => !wanders(p.accel.biasModel),
  },
  {
    path: 'accel.turnOnBiasSigmaMPerS2',
    group: 'accel',
    label: 'Turn-on bias σ',
    quantity: 'accelBias',
    range: shown('accelBias', 0.01, 500),
    more: 'more: the first bias estimate moves further',
    advanced: true,
    counts: (p) => p.accel.biasModel !== 'gauss-markov',
  },
  {
    path: 'gnss.positionScale',
    group: 'gnss',
    label: 'Position σ × scale',
    quantity: 'factor',
    range: { low: 0.05, high: 50 },
    more: 'more: smoother track, slower correction',
    counts: (p) => p.gnss.usePosition,
  },
  {
    path: 'gnss.velocityScale',
    group: 'gnss',
    label: 'Velocity σ × scale',
    quantity: 'factor',
    range: { low: 0.05, high: 50 },
    more: 'more: trusts the IMU longer',
    counts: (p) => p.gnss.useVelocity,
  },
  ...fixedSigmas(),
  {
    path: 'gate.recoveryAfterS',
    group: 'gate',
    label: 'Recovery after',
    quantity: 'time',
    range: shown('time', 0.5, 600),
    more: 'longer: a lasting disagreement is shut out longer',
    advanced: true,
    counts: (p) => p.gate.enabled,
  },
];

function fixedSigmas(): SliderSpec[] {
  const sigma = (
    path: string,
    label: string,
    quantity: 'length' | 'speed',
    low: number,
    high: number,
  ): SliderSpec => ({
    path: `gnss.${path}`,
    group: 'gnss',
    label,
    quantity,
    range: { low, high },
    more: 'used where the log gives no accuracy, or always when fixed',
    advanced: true,
  });
  return [
    sigma('positionSigmaHorizontalM', 'Fixed σ, horizontal position', 'length', 0.005, 100),
    sigma('positionSigmaVerticalM', 'Fixed σ, vertical position', 'length', 0.005, 100),
    sigma('velocitySigmaHorizontalMPerS', 'Fixed σ, horizontal velocity', 'speed', 0.002, 20),
    sigma('velocitySigmaVerticalMPerS', 'Fixed σ, vertical velocity', 'speed', 0.002, 20),
  ];
}

export const GROUP_TITLES: Record<ParameterGroup, string> = {
  gyro: 'Gyro',
  accel: 'Accelerometer',
  gnss: 'GNSS',
  gate: 'Gate',
  aids: 'Aids',
};
