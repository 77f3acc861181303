import { axisWords, whiteness, whitenessSentence } from '@/components/bench/whiteness-data';
import { correlationStems } from '@/components/charts/quiet/correlation-stems';
import type { ChannelStatistics } from '@/shared/contracts/runs';
import { makeSummary } from './summary';

const channel = (name: string, change: Partial<ChannelStatistics> = {}): ChannelStatistics => ({
  channel: name,
  unit: 'm',
  used: 400,
  rejected: 0,
  mean: 0,
  sigmaRatio: 1,
  lag1: 0.5,
  lag1Band: 0.098,
  autocorrelation: [0.5, 0.05, -0.2],
  whitenessP: 0.43,
  ...change,
});
const summary = makeSummary({
  channels: [
    channel('position north'),
    channel('position east', { whitenessP: 2e-7 }),
    channel('position down', { autocorrelation: undefined, whitenessP: undefined }),
    channel('velocity north'),
  ],
});

test('axes of the group, those with too small a sample left out', () => {
  const found = whiteness(summary, 'position')!;
  expect(found.axes.map(({ label }) => label)).toEqual(['N', 'E']);
  expect(found.axes[0]).toMatchObject({ values: [0.5, 0.05, -0.2], outside: 2, p: 0.43 });
  expect([found.band, found.lags]).toEqual([0.098, 3]);
  expect(found.axes.map(axisWords)).toEqual(['N p 0.43', 'E p < 0.001']);
  expect(whitenessSentence(found)).toBe(
    '95 % band ±0.098. N: 2 of 3 lags outside, Ljung–Box p 0.43; E: 2 of 3 lags outside, Ljung–Box p < 0.001.',
  );
});

test('nothing where the group was not used', () => {
  expect(whiteness(makeSummary({ channels: [] }), 'velocity')).toBeNull();
  expect(whiteness(null, 'velocity')).toBeNull();
});

test('stems stand at their lags and reach their values', () => {
  const box = { left: 0, right: 300, top: 0, bottom: 100 };
  const drawn = correlationStems(
    { axes: [{ tone: 'north', values: [0.5, 0.05, -0.2] }], band: 0.098, lags: 3 },
    box,
  );
  const valueOf = (y: number) => drawn.low + ((100 - y) / 100) * (drawn.high - drawn.low);
  const stems = [...drawn.stems[0]!.path.matchAll(/M([\d.]+) ([\d.]+)V([\d.]+)/g)].map((match) =>
    match.slice(1).map(Number),
  );
  expect(stems.map(([x]) => x)).toEqual([50, 150, 250]);
  for (const [i, value] of [0.5, 0.05, -0.2].entries()) {
    expect(valueOf(stems[i]![1]!)).toBeCloseTo(0, 2);
    expect(valueOf(stems[i]![2]!)).toBeCloseTo(value, 2);
  }
  expect(drawn.low).toBeLessThan(-0.098);
  expect(drawn.high).toBeGreaterThan(0.5);
});
