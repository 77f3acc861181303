/** Every parameter as a row of a table: its name, its display unit, its value there, and what it was in the version before. */
import { readPath, type ParameterValue } from '@/components/bench/parameter-path';
import { GROUP_TITLES, SLIDERS } from '@/components/bench/parameter-specs';
import type { Parameters } from '@/shared/contracts/parameters';
import { defaultUnit, toDisplay, type Quantity } from '@/shared/units';

export interface ParameterRow {
  path: string;
  label: string;
  unit: string;
  /** In the display unit, or in words; null: not set. */
  value: number | string | null;
  before: number | string | null;
  changed: boolean;
}

export interface ParameterSection {
  title: string;
  rows: ParameterRow[];
}

interface RowSpec {
  path: string;
  section: string;
  label: string;
  quantity?: Quantity;
  unit?: string;
  words?: Record<string, string>;
}

/** Sections in the order of the bench; `parent` null: a first version. Rows that were never set are left out. */
export function parameterSections(parameters: Parameters, parent: Parameters | null): ParameterSection[] {
  const sections = new Map<string, ParameterRow[]>();
  for (const spec of SPECS) {
    const now = readPath(parameters, spec.path);
    const then = parent ? readPath(parent, spec.path) : null;
    if (now === null && then === null) continue;
    const rows = sections.get(spec.section) ?? [];
    sections.set(spec.section, rows);
    rows.push({
      path: spec.path,
      label: spec.label,
      unit: unitOf(spec),
      value: shown(spec, now),
      before: shown(spec, then),
      changed: parent !== null && JSON.stringify(now) !== JSON.stringify(then),
    });
  }
  return [...sections].map(([title, rows]) => ({ title, rows }));
}

/** How many parameters a version changed. */
export const changeCount = (sections: readonly ParameterSection[]): number =>
  sections.reduce((sum, { rows }) => sum + rows.filter((row) => row.changed).length, 0);

const unitOf = (spec: RowSpec): string =>
  spec.quantity ? defaultUnit(spec.quantity).symbol : (spec.unit ?? '');

function shown(spec: RowSpec, value: ParameterValue): number | string | null {
  if (value === null) return null;
  if (typeof value === 'boolean') return value ? 'on' : 'off';
  if (typeof value === 'string') return spec.words?.[value] ?? value;
  if (typeof value === 'number') return spec.quantity ? toDisplay(value, defaultUnit(spec.quantity)) : value;
  return value.map((part) => String(part).replace('-', '−')).join(', ');
}

const BIAS_MODELS = {
  'random-walk': 'random walk',
  'gauss-markov': 'Gauss–Markov',
  'turn-on-plus-wander': 'turn-on plus wander',
};

const sliderRows = (section: 'gyro' | 'accel' | 'gnss' | 'gate'): RowSpec[] =>
  SLIDERS.filter((slider) => slider.group === section).map(({ path, label, quantity }) => ({
    path,
    label,
    quantity,
    section: GROUP_TITLES[section],
  }));

const SPECS: readonly RowSpec[] = [
  ...sliderRows('gyro'),
  { path: 'gyro.biasModel', section: GROUP_TITLES.gyro, label: 'Bias model', words: BIAS_MODELS },
  ...sliderRows('accel'),
  { path: 'accel.biasModel', section: GROUP_TITLES.accel, label: 'Bias model', words: BIAS_MODELS },
  { path: 'gnss.usePosition', section: GROUP_TITLES.gnss, label: 'Position used' },
  { path: 'gnss.useVelocity', section: GROUP_TITLES.gnss, label: 'Velocity used' },
  {
    path: 'gnss.sigmaSource',
    section: GROUP_TITLES.gnss,
    label: 'Accuracy from',
    words: { receiver: 'the receiver', fixed: 'fixed values' },
  },
  ...sliderRows('gnss'),
  { path: 'gnss.positionFloorM', section: GROUP_TITLES.gnss, label: 'Least position σ', quantity: 'length' },
  {
    path: 'gnss.velocityFloorMPerS',
    section: GROUP_TITLES.gnss,
    label: 'Least velocity σ',
    quantity: 'speed',
  },
  { path: 'gnss.latencyS', section: GROUP_TITLES.gnss, label: 'Latency', quantity: 'time' },
  { path: 'leverArmM', section: GROUP_TITLES.gnss, label: 'Lever arm: forward, right, down', unit: 'm' },
  { path: 'gate.enabled', section: GROUP_TITLES.gate, label: 'χ² gate' },
  { path: 'gate.probability', section: GROUP_TITLES.gate, label: 'Gate probability', quantity: 'percent' },
  ...sliderRows('gate'),
  { path: 'initial.timeS', section: 'Start', label: 'Starts at', quantity: 'time' },
  { path: 'initial.position.latDeg', section: 'Start', label: 'Latitude', unit: '°' },
  { path: 'initial.position.lonDeg', section: 'Start', label: 'Longitude', unit: '°' },
  { path: 'initial.position.heightM', section: 'Start', label: 'Height', unit: 'm' },
  { path: 'initial.velocityNedMPerS', section: 'Start', label: 'Velocity: north, east, down', unit: 'm/s' },
  { path: 'initial.attitude.rollDeg', section: 'Start', label: 'Roll', unit: '°' },
  { path: 'initial.attitude.pitchDeg', section: 'Start', label: 'Pitch', unit: '°' },
  { path: 'initial.attitude.yawDeg', section: 'Start', label: 'Yaw', unit: '°' },
  { path: 'initial.headingDeg', section: 'Start', label: 'Heading', unit: '°' },
  { path: 'initial.positionSigmaNedM', section: 'Start', label: 'Position σ: north, east, down', unit: 'm' },
  {
    path: 'initial.velocitySigmaNedMPerS',
    section: 'Start',
    label: 'Velocity σ: north, east, down',
    unit: 'm/s',
  },
  { path: 'initial.attitudeSigmaDeg', section: 'Start', label: 'Attitude σ: roll, pitch, yaw', unit: '°' },
  { path: 'initial.gyroBiasRadPerS', section: 'Start', label: 'Gyro bias: x, y, z', unit: 'rad/s' },
  { path: 'initial.accelBiasMPerS2', section: 'Start', label: 'Accelerometer bias: x, y, z', unit: 'm/s²' },
  {
    path: 'initial.courseSpeedMPerS',
    section: 'Start',
    label: 'Heading from course above',
    quantity: 'speed',
  },
  {
    path: 'mechanisation.scheme',
    section: 'Mechanisation',
    label: 'Scheme',
    words: {
      'coning-sculling': 'coning and sculling',
      trapezoidal: 'trapezoidal, for study',
      rectangular: 'rectangular, for study',
    },
  },
  {
    path: 'mechanisation.covarianceIntervalS',
    section: 'Mechanisation',
    label: 'Covariance every',
    quantity: 'time',
  },
];
