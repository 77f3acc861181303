import type { Metric } from '@/shared/contracts/requirements';
import type { RunSummary } from '@/shared/contracts/runs';
import { firstTimeBelow, sigmaCurve } from '@/shared/requirements/bias-sigma';
import { judge } from '@/shared/requirements/judge';
import { requirementSentence } from '@/shared/requirements/metric-words';
import { scheduleWindows } from '@/shared/requirements/schedule-windows';

const point = (afterS: number, horizontalM: number) => ({
  afterS,
  horizontalM,
  verticalM: horizontalM / 2,
  velocityMPerS: horizontalM / 10,
  headingDeg: 0.1,
  predictedHorizontalM: 1,
  predictedVerticalM: 1,
});
const windowOf = (startS: number, points: ReturnType<typeof point>[]) => ({
  startS,
  endS: startS + 30,
  withhold: 'gnss' as const,
  reference: 'truth' as const,
  points,
});
const vectors = {
  positionM: [1, 1, 1],
  velocityMPerS: [1, 1, 1],
  gyroBiasRadPerS: [1, 1, 1],
  accelBiasMPerS2: [1, 1, 1],
};
const summary = {
  outages: [1, 2, 3, 4, 5].map((drift) =>
    windowOf(drift * 100, [point(10, drift), ...(drift === 5 ? [] : [point(30, drift * 10)])]),
  ),
  groups: [
    {
      group: 'position',
      dimension: 3,
      used: 95,
      rejected: 5,
      nisMean: 3.2,
      nisBounds: [2.5, 3.5],
      insideShare: 0.94,
    },
    {
      group: 'velocity',
      dimension: 3,
      used: 0,
      rejected: 0,
      nisMean: null,
      nisBounds: null,
      insideShare: null,
    },
  ],
  finalSigma: { ...vectors, attitudeDeg: [0.1, 0.2, 0.9] },
  meanSigma: { ...vectors, attitudeDeg: [0.3, 0.2, 1.5] },
  truth: null,
} as unknown as RunSummary;
const biasSigma = {
  gyro: { afterS: [0, 10, 20], sigma: [1e-2, 1e-3, 1e-4] },
  accel: { afterS: [0], sigma: [1] },
};
const of = (
  metric: Metric,
  limit: number | null = 1e9,
  comparison: 'at-most' | 'at-least' | 'inside-bounds' = 'at-most',
) => judge(metric, comparison, limit, { summary, biasSigma });
const drift = (statistic: 'median' | 'p95' | 'maximum', afterS = 10): Metric => ({
  kind: 'drift',
  quantity: 'horizontal',
  afterS,
  statistic,
});

describe('a verdict', () => {
  it('takes drift over the windows that reach the time', () => {
    expect(of(drift('median'))).toMatchObject({ value: 3, reason: 'over 5 windows' });
    expect(of(drift('p95')).value).toBeCloseTo(4.8, 12);
    expect(of(drift('maximum')).value).toBe(5);
    expect(of(drift('maximum', 30))).toMatchObject({ value: 40, reason: 'over 4 windows' });
    expect(of({ ...drift('maximum'), quantity: 'vertical' } as Metric).value).toBe(2.5);
  });

  it('meets a limit that it equals', () => {
    expect(of(drift('maximum'), 5).verdict).toBe('pass');
    expect(of(drift('maximum'), 4.999).verdict).toBe('fail');
    expect(of(drift('maximum'), 5, 'at-least').verdict).toBe('pass');
    expect(of(drift('maximum'), 5.001, 'at-least').verdict).toBe('fail');
  });

  it('says what a recording cannot show', () => {
    expect(of(drift('median', 60))).toMatchObject({ verdict: 'not-applicable', value: null });
    expect(of({ kind: 'rmse', quantity: 'yaw' }).reason).toContain('no reference trajectory');
    expect(of({ kind: 'rejected-share', group: 'velocity' }).reason).toContain('no velocity');
  });

  it('compares the mean NIS with its own bounds', () => {
    const nis: Metric = { kind: 'nis-mean', group: 'position' };
    expect(of(nis, null, 'inside-bounds')).toMatchObject({ verdict: 'pass', value: 3.2, bounds: [2.5, 3.5] });
    const wide = { ...summary, groups: [{ ...summary.groups[0]!, nisMean: 3.6 }] };
    expect(judge(nis, 'inside-bounds', null, { summary: wide, biasSigma }).verdict).toBe('fail');
  });

  it('reads shares, attitude and convergence', () => {
    expect(of({ kind: 'rejected-share', group: 'position' }).value).toBeCloseTo(0.05, 12);
    expect(of({ kind: 'nis-inside-share', group: 'position' }).value).toBe(0.94);
    expect(of({ kind: 'attitude-sigma', axis: 'largest', when: 'end' }).value).toBe(0.9);
    expect(of({ kind: 'attitude-sigma', axis: 'roll', when: 'mean' }).value).toBe(0.3);
    expect(of({ kind: 'bias-convergence', sensor: 'gyro', sigma: 2e-3 }).value).toBe(10);
    expect(of({ kind: 'bias-convergence', sensor: 'accel', sigma: 0.5 })).toMatchObject({
      verdict: 'fail',
      value: null,
    });
  });
});

describe('the σ of the biases', () => {
  it('falls as a curve from which the time below a threshold is read', () => {
    const timeS = Float64Array.from({ length: 2001 }, (_, k) => 50 + k / 10);
    const axis = timeS.map((t) => 1e-2 * Math.exp(-(t - 50) / 40));
    const late = axis.map((value, k) => (k === 800 ? 5e-3 : value)); // one axis comes back once, at 80 s
    const curve = sigmaCurve(timeS, [axis, late], 50);
    expect(curve.afterS.length).toBeLessThan(600);
    const after = firstTimeBelow({ gyro: curve, accel: curve }, 'gyro', 4e-3)!;
    expect(after).toBeGreaterThan(80);
    expect(after).toBeLessThan(80.5);
    const low = firstTimeBelow({ gyro: curve, accel: curve }, 'gyro', 1e-3)!;
    expect(low).toBeGreaterThanOrEqual(40 * Math.log(10));
    expect(low).toBeLessThan(40 * Math.log(10) + 0.5);
    expect(firstTimeBelow({ gyro: curve, accel: curve }, 'gyro', 1e-5)).toBeNull();
  });
});

describe('a schedule', () => {
  const every = { kind: 'every', everyS: 100, forS: 30, firstAfterS: 60, withhold: 'gnss' } as const;

  it('lays whole windows from the alignment on', () => {
    const windows = scheduleWindows(every, [12.5, 290]);
    expect(windows.map(({ startS, endS }) => [startS, endS])).toEqual([
      [72.5, 102.5],
      [172.5, 202.5],
    ]);
    expect(scheduleWindows(every, [0, 80])).toEqual([]);
    expect(scheduleWindows({ kind: 'none' }, [0, 1e6])).toEqual([]);
    expect(scheduleWindows({ ...every, everyS: 30 }, [0, 1e6])).toHaveLength(200);
  });
});

describe('the words', () => {
  it('give limits with their units, shares in percent', () => {
    expect(requirementSentence(drift('p95', 60), 'at-most', 15)).toBe(
      'Horizontal drift after 60 s of coasting, 95th percentile: at most 15\u00a0m',
    );
    expect(requirementSentence({ kind: 'rejected-share', group: 'position' }, 'at-most', 0.02)).toBe(
      'Rejected share of position measurements: at most 2\u00a0%',
    );
    expect(requirementSentence({ kind: 'nis-mean', group: 'velocity' }, 'inside-bounds', null)).toBe(
      'Mean NIS of velocity: inside its 95 % bounds',
    );
  });
});
