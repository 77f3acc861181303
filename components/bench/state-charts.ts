/** σ of the states, bias estimates, and the error while coasting. */
import type { FrameColumn } from '@/shared/contracts/frames';
import type { OutageResult } from '@/shared/contracts/runs';
import { formatNumber } from '@/shared/format';
import { displayUnit, scaleOf, type DisplayUnits } from '@/shared/display-units';
import { RAD_PER_DEG } from '@/shared/units';
import { radius95OverDrms } from '@/shared/charts/model/chi-square';
import type { Annotation, ChartContent, TimeWindow } from '@/shared/charts/model/layers';
import type { TimeSeries } from '@/shared/charts/model/series';
import type { RunData } from '@/hooks/live/run-data';
import { derivedSeries, seriesOf, stateRowAt, type CurvesSource } from './curves';
import {
  ANGLES,
  NED,
  XYZ,
  around,
  axisCurves,
  fromZero,
  ghostRemark,
  sigmaBand,
  stacked,
  type CurveSpec,
} from './chart-parts';

type Scaled = ReturnType<typeof scaleOf>;
type Windows = () => readonly TimeWindow[];
type StateColumn = FrameColumn<'state'>;

/** σ of position, velocity or attitude, one line an axis. */
export function sigmaChart(
  source: CurvesSource,
  state: 'position' | 'velocity' | 'attitude',
  windows: Windows,
  chosen: DisplayUnits = {},
): ChartContent {
  const { symbol: unit, factor } = {
    position: scaleOf('length', chosen),
    velocity: scaleOf('speed', chosen),
    attitude: scaleOf('angle', chosen, RAD_PER_DEG),
  }[state];
  const specs = {
    position: axisCurves('sigma', 'state', NED, (axis) => `sigma_${axis.key}_m` as StateColumn, factor),
    velocity: axisCurves('sigma', 'state', NED, (axis) => `sigma_v${axis.key}_m_s` as StateColumn, factor),
    attitude: axisCurves('sigma', 'state', ANGLES, (axis) => `sigma_${axis.key}_deg` as StateColumn, factor),
  }[state];
  return {
    id: `sigma.${state}`,
    title: { position: 'Position σ', velocity: 'Velocity σ', attitude: 'Attitude σ' }[state],
    unit,
    remark: () => ghostRemark(source, '1σ'),
    layers: stacked(source, specs),
    windows,
    domain: (fromS, toS) => fromZero(allRuns(source, specs), fromS, toS),
    sentence: () => {
      const summary = source.summary();
      if (!summary) return 'No figures yet.';
      const key = ({ position: 'positionM', velocity: 'velocityMPerS', attitude: 'attitudeDeg' } as const)[
        state
      ];
      const written = (values: readonly number[]) =>
        values.map((value) => formatNumber(value * factor)).join(', ');
      return `Mean ${written(summary.meanSigma[key])} ${unit}, at the end ${written(summary.finalSigma[key])} ${unit}.`;
    },
  };
}

/** √(σ_N² + σ_E²): how far the filter believes itself off. */
export function horizontalSigmaChart(
  source: CurvesSource,
  windows: Windows,
  chosen: DisplayUnits = {},
): ChartContent {
  const { symbol, factor } = scaleOf('length', chosen);
  const spec: CurveSpec = {
    id: 'horizontal',
    column: 'sigma_horizontal',
    label: 'horizontal σ',
    ghostLabel: 'baseline',
    tone: 'north',
    series: (data) =>
      derivedSeries(data, 'state', (run) => {
        const [n, e] = [run.column('state', 'sigma_n_m'), run.column('state', 'sigma_e_m')];
        return (row) => factor * Math.hypot(n[row]!, e[row]!);
      }),
  };
  return {
    id: 'sigma.horizontal',
    title: 'Horizontal σ',
    unit: symbol,
    layers: stacked(source, [spec]),
    windows,
    domain: (fromS, toS) => fromZero(allRuns(source, [spec]), fromS, toS),
    sentence: () => {
      const sigma = source.summary()?.meanSigma.positionM;
      return sigma
        ? `Mean ${formatNumber(factor * Math.hypot(sigma[0], sigma[1]))} ${symbol}.`
        : 'No figures yet.';
    },
  };
}

/** Estimated biases with ±1σ. */
export function biasChart(
  source: CurvesSource,
  sensor: 'gyro' | 'accel',
  windows: Windows,
  chosen: DisplayUnits = {},
): ChartContent {
  const unit = displayUnit(sensor === 'gyro' ? 'gyroBias' : 'accelBias', chosen);
  const si = sensor === 'gyro' ? 'rad_s' : 'm_s2';
  const estimate = (key: string) => `${sensor}_bias_${key}_${si}` as StateColumn;
  const specs = axisCurves('bias', 'state', XYZ, (axis) => estimate(axis.key), 1 / unit.toSi);
  const bands = XYZ.map((axis) =>
    sigmaBand(
      source,
      `sigma.${axis.key}`,
      axis.tone,
      (data) => seriesOf(data, 'state', `sigma_${estimate(axis.key)}` as StateColumn, 1 / unit.toSi),
      {
        label: axis.key === 'x' ? '±1σ' : undefined,
        centre: (data) => seriesOf(data, 'state', estimate(axis.key), 1 / unit.toSi),
      },
    ),
  );
  return {
    id: `bias.${sensor}`,
    title: sensor === 'gyro' ? 'Gyro bias' : 'Accelerometer bias',
    unit: unit.symbol,
    remark: () => ghostRemark(source),
    layers: [...bands, ...stacked(source, specs)],
    windows,
    domain: (fromS, toS) => around(allRuns(source, specs), fromS, toS),
    sentence: () => {
      const summary = source.summary();
      if (!summary) return 'No figures yet.';
      const values = sensor === 'gyro' ? summary.gyroBiasRadPerS : summary.accelBiasMPerS2;
      const written = values.map((value) => formatNumber(value / unit.toSi)).join(', ');
      return `At the end x, y, z: ${written} ${unit.symbol}.`;
    },
  };
}

/** Error while coasting with the 95 % that the filter predicted. */
export function coastingChart(
  source: CurvesSource,
  direction: 'horizontal' | 'vertical',
  windows: Windows,
  chosen: DisplayUnits = {},
): ChartContent {
  const scale = scaleOf('length', chosen);
  const error: CurveSpec = {
    id: 'error',
    label: 'error',
    ghostLabel: 'baseline',
    tone: 'ink',
    width: 2,
    breaks: true,
    series: (data) =>
      derivedSeries(data, 'coasting', (run) => {
        const values = run.column('coasting', direction === 'horizontal' ? 'horizontal_m' : 'vertical_m');
        return (row) => scale.factor * Math.abs(values[row]!);
      }),
  };
  const predicted = (data: RunData | null) => predicted95(data, direction, scale.factor);
  return {
    id: `coasting.${direction}`,
    title: direction === 'horizontal' ? 'Coasting error, horizontal' : 'Coasting error, vertical',
    unit: scale.symbol,
    remark: () => referenceWords(source),
    layers: [
      {
        kind: 'area',
        id: 'predicted',
        column: 'predicted_95',
        tone: 'vermilion',
        label: '95 % predicted',
        breaks: true,
        series: () => predicted(source.curves().current),
      },
      ...stacked(source, [error]),
    ],
    windows,
    domain: (fromS, toS) => {
      const { current, previous } = source.curves();
      const all = [predicted(current), ...allRuns(source, [error]), predicted(previous)];
      return fromZero(all, fromS, toS);
    },
    annotations: () => coastingNotes(source, error.series, predicted, direction, scale),
    sentence: () => coastingSentence(source, scale),
  };
}

/**
 * Radius (horizontal) or half-width (vertical) that 95 % of errors should stay below. The ellipse's shape comes from the
 * state at the same time; its size from the coasting table.
 */
function predicted95(
  data: RunData | null,
  direction: 'horizontal' | 'vertical',
  factor: number,
): TimeSeries | null {
  if (direction === 'vertical') return seriesOf(data, 'coasting', 'predicted_vertical_m', 1.96 * factor);
  return derivedSeries(data, 'coasting', (run) => {
    const time = run.column('coasting', 'time_s');
    const drms = run.column('coasting', 'predicted_horizontal_m');
    const [n, e] = [run.column('state', 'sigma_n_m'), run.column('state', 'sigma_e_m')];
    const cov = run.column('state', 'cov_ne_m2');
    return (row) => {
      const state = stateRowAt(run, time[row]!);
      const ratio = state < 0 ? 1 : axisRatio(n[state]!, e[state]!, cov[state]!);
      return factor * drms[row]! * radius95OverDrms(ratio);
    };
  });
}

/** Smaller ÷ larger semi-axis of the plane covariance. */
export function axisRatio(sigmaN: number, sigmaE: number, cov: number): number {
  const [a, b] = [sigmaN * sigmaN, sigmaE * sigmaE];
  const half = Math.hypot((a - b) / 2, Number.isFinite(cov) ? cov : 0);
  const larger = (a + b) / 2 + half;
  return larger > 0 ? Math.sqrt(Math.max(0, (a + b) / 2 - half) / larger) : 1;
}

/** The error at each window's end in figures. */
function coastingNotes(
  source: CurvesSource,
  error: (data: RunData | null) => TimeSeries | null,
  predicted: (data: RunData | null) => TimeSeries | null,
  direction: 'horizontal' | 'vertical',
  { symbol, factor }: Scaled,
): Annotation[] {
  const { current } = source.curves();
  const series = error(current);
  const bound = predicted(current);
  if (!current || !series || !bound) return [];
  const outage = current.column('coasting', 'outage');
  const notes: Annotation[] = [];
  // The curve's last point may lie a moment before the window's end; the figure is the summary's.
  const endErrors = current.complete
    ? source.summary()?.outages.map((one) => endError(one, direction))
    : undefined;
  for (let row = 0; row < series.length; row++) {
    const last = row + 1 === series.length || outage[row + 1] !== outage[row];
    if (!last) continue;
    const timeS = series.time[row]!;
    const end = endErrors?.[outage[row]!];
    const text = `${formatNumber(end === undefined ? series.at(row) : end * factor)} ${symbol}`;
    notes.push({
      timeS,
      value: series.at(row),
      text,
      number: true,
      tone: 'ink',
    });
    // Said once: of many windows the words would cover the curves.
    if (notes.length === 1)
      notes.push({ timeS, value: bound.at(row), text: '95 % predicted', tone: 'vermilion' });
  }
  return notes;
}

/** Error at the window's end; undefined where the run did not get there. */
function endError({ points }: OutageResult, direction: 'horizontal' | 'vertical'): number | undefined {
  const last = points[points.length - 1];
  return direction === 'horizontal' ? last?.horizontalM : last && Math.abs(last.verticalM);
}

function referenceWords(source: CurvesSource): string {
  const reference = source.summary()?.outages[0]?.reference;
  if (!reference) return '';
  return reference === 'truth' ? 'against the truth' : 'against the fully aided solution';
}

function coastingSentence(source: CurvesSource, { symbol, factor }: Scaled): string {
  const outages = source.summary()?.outages ?? [];
  if (outages.length === 0) return 'No outage window yet: draw one on the strip.';
  return outages
    .map(({ points, startS, endS }) => {
      const last = points[points.length - 1];
      return last
        ? `After ${formatNumber(endS - startS)} s the error is ${formatNumber(last.horizontalM * factor)} ${symbol} horizontally, ${formatNumber(
            last.predictedHorizontalM * factor,
          )} ${symbol} were predicted (1σ).`
        : '';
    })
    .filter(Boolean)
    .join(' ');
}

const allRuns = (source: CurvesSource, specs: readonly CurveSpec[]) => {
  const { current, previous, ghost } = source.curves();
  return specs.flatMap((spec) => [current, previous, ghost].map(spec.series));
};
