/** Which charts there are, and how they are gathered into views: several stacked when wide, one at a time on the phone. */
import type { ChartContent, TimeWindow } from '@/shared/charts/model/layers';
import type { DisplayUnits } from '@/shared/display-units';
import type { CurvesSource } from './curves';
import { innovationChart, nisChart } from './innovation-charts';
import { biasChart, coastingChart, horizontalSigmaChart, sigmaChart } from './state-charts';

export type ViewId =
  | 'overview'
  | 'coasting'
  | 'budget'
  | 'innovations'
  | 'whiteness'
  | 'nis'
  | 'covariance'
  | 'biases'
  | 'track';

export interface ViewSpec {
  id: ViewId;
  label: string;
}
export const WIDE_VIEWS: readonly ViewSpec[] = [
  { id: 'overview', label: 'Overview' },
  { id: 'coasting', label: 'Coasting' },
  { id: 'budget', label: 'Budget' },
  { id: 'innovations', label: 'Innovations' },
  { id: 'whiteness', label: 'Whiteness' },
  { id: 'nis', label: 'NIS' },
  { id: 'covariance', label: 'Covariance' },
  { id: 'biases', label: 'Biases' },
  { id: 'track', label: 'Track' },
];

/** What a phone shows one at a time; `view` is the wide view that it belongs to. */
export const PHONE_CHARTS = [
  { id: 'coasting.horizontal', label: 'Coasting', view: 'coasting' },
  { id: 'innovation.position', label: 'Innovation, position', view: 'innovations' },
  { id: 'innovation.velocity', label: 'Innovation, velocity', view: 'innovations' },
  { id: 'nis.position', label: 'NIS, position', view: 'nis' },
  { id: 'nis.velocity', label: 'NIS, velocity', view: 'nis' },
  { id: 'sigma.position', label: 'Position σ', view: 'covariance' },
  { id: 'sigma.velocity', label: 'Velocity σ', view: 'covariance' },
  { id: 'sigma.attitude', label: 'Attitude σ', view: 'covariance' },
  { id: 'bias.gyro', label: 'Gyro bias', view: 'biases' },
  { id: 'bias.accel', label: 'Accelerometer bias', view: 'biases' },
  { id: 'track', label: 'Track', view: 'track' },
  { id: 'growth', label: 'Drift growth', view: 'coasting' },
  { id: 'budget.horizontal', label: 'Error budget, horizontal', view: 'budget' },
  { id: 'budget.vertical', label: 'Error budget, vertical', view: 'budget' },
  { id: 'histogram.position', label: 'Distribution, position', view: 'innovations' },
  { id: 'histogram.velocity', label: 'Distribution, velocity', view: 'innovations' },
  { id: 'whiteness.position', label: 'Whiteness, position', view: 'whiteness' },
  { id: 'whiteness.velocity', label: 'Whiteness, velocity', view: 'whiteness' },
] as const satisfies readonly { id: string; label: string; view: ViewId }[];
export type PhoneChart = (typeof PHONE_CHARTS)[number]['id'];

export type TimeCharts = ReturnType<typeof makeTimeCharts>;

/** All charts over time of a bench; made once, they read the curves at each drawing. */
export function makeTimeCharts(
  source: CurvesSource,
  windows: () => readonly TimeWindow[],
  units: DisplayUnits = {},
) {
  return {
    'innovation.position': innovationChart(source, 'position', windows, units),
    'innovation.velocity': innovationChart(source, 'velocity', windows, units),
    'nis.position': nisChart(source, 'position', windows),
    'nis.velocity': nisChart(source, 'velocity', windows),
    'sigma.horizontal': horizontalSigmaChart(source, windows, units),
    'sigma.position': sigmaChart(source, 'position', windows, units),
    'sigma.velocity': sigmaChart(source, 'velocity', windows, units),
    'sigma.attitude': sigmaChart(source, 'attitude', windows, units),
    'bias.gyro': biasChart(source, 'gyro', windows, units),
    'bias.accel': biasChart(source, 'accel', windows, units),
    'coasting.horizontal': coastingChart(source, 'horizontal', windows, units),
    'coasting.vertical': coastingChart(source, 'vertical', windows, units),
  } satisfies Record<string, ChartContent>;
}

/** Charts over time of a wide view, top to bottom. Without a window there is nothing to coast through. */
export function chartsOf(view: ViewId, hasWindows: boolean): (keyof TimeCharts)[] {
  switch (view) {
    case 'overview':
      return [
        'innovation.position',
        'nis.position',
        'sigma.horizontal',
        hasWindows ? 'coasting.horizontal' : 'innovation.velocity',
      ];
    case 'coasting':
      return hasWindows ? ['coasting.horizontal', 'coasting.vertical'] : [];
    case 'innovations':
      return ['innovation.position', 'innovation.velocity'];
    case 'nis':
      return ['nis.position', 'nis.velocity'];
    case 'covariance':
      return ['sigma.position', 'sigma.velocity', 'sigma.attitude'];
    case 'biases':
      return ['bias.gyro', 'bias.accel'];
    case 'budget':
    case 'whiteness':
    case 'track':
      return [];
  }
}
