import { driftOf, headlineFigures, ratioBounds95 } from '@/components/bench/headline';
import { driftPoint, makeSummary, outage } from './summary';

const figure = (key: string, ...summaries: Parameters<typeof headlineFigures>) =>
  headlineFigures(...summaries).find((one) => one.key === key)!;

describe('drift', () => {
  it('is read at 60 s where windows last that long, as RMS of all that do', () => {
    const summary = makeSummary({
      outages: [
        outage(100, [driftPoint(30, 3, 4), driftPoint(60, 12, 16), driftPoint(90, 40, 50)]),
        outage(400, [driftPoint(30, 5, 4), driftPoint(60, 16, 12)]),
        outage(800, [driftPoint(20, 100, 1)]),
      ],
    });
    const drift = driftOf(summary)!;
    expect([drift.afterS, drift.windows]).toEqual([60, 2]);
    expect(drift.actual).toBeCloseTo(Math.sqrt((12 ** 2 + 16 ** 2) / 2), 9);
    expect(drift.ratio).toBeCloseTo(1, 9);
    expect(figure('drift', summary, null)).toMatchObject({
      label: 'Drift after 60 s',
      unit: 'm',
      remark: 'RMS of 2 windows',
    });
  });

  it('is read at the end of the longest where none lasts 60 s', () => {
    const summary = makeSummary({ outages: [outage(100, [driftPoint(10, 1, 1), driftPoint(25, 4, 5)])] });
    expect(figure('drift', summary, null)).toMatchObject({
      label: 'Drift after 25 s',
      value: 4,
      remark: '1 window',
    });
  });

  it('says what to do while there is no window', () => {
    expect(figure('drift', makeSummary(), null)).toMatchObject({
      value: null,
      remark: 'draw an outage on the strip',
    });
  });

  it('is compared only at the same time after the start', () => {
    const now = makeSummary({ outages: [outage(100, [driftPoint(60, 10, 10)])] });
    const equal = makeSummary({ outages: [outage(100, [driftPoint(60, 13.1, 10)])] });
    const shorter = makeSummary({ outages: [outage(100, [driftPoint(30, 2, 2)])] });
    expect(figure('drift', now, equal).change).toBe('−3.10 m');
    expect(figure('drift', now, shorter).change).toBeNull();
    expect(figure('drift', now, now).change).toBe('±0');
  });
});

describe('the ratio', () => {
  it('is judged by how much so many windows can prove', () => {
    const windows = (count: number, actual: number) =>
      makeSummary({
        outages: Array.from({ length: count }, (_, i) => outage(i * 100, [driftPoint(60, actual, 10)])),
      });
    expect(figure('ratio', windows(1, 16), null).verdict).toBe('good');
    expect(figure('ratio', windows(20, 16), null).verdict).toBe('bad');
    expect(figure('ratio', windows(20, 10), null).verdict).toBe('good');
  });

  it.each([
    // χ² quantiles at 2.5 % and 97.5 %, divided by the degrees of freedom: Abramowitz & Stegun, table 26.8.
    [5, 3.247 / 10, 20.483 / 10],
    [15, 16.791 / 30, 46.979 / 30],
  ])('has the χ² band of %d windows', (windows, low, high) => {
    const bounds = ratioBounds95(windows);
    expect(bounds[0] ** 2).toBeCloseTo(low, 2);
    expect(bounds[1] ** 2).toBeCloseTo(high, 2);
  });
});

describe('consistency', () => {
  it('NIS is good inside its bounds, and says on which side it is outside', () => {
    expect(figure('nis-position', makeSummary(), null)).toMatchObject({ verdict: 'good', unit: 'of 3' });
    expect(figure('nis-velocity', makeSummary(), null)).toMatchObject({
      verdict: 'bad',
      remark: 'too low, bounds 2.94 to 3.06',
    });
  });

  it('rejected is a share of all fixes, with their number', () => {
    expect(figure('rejected', makeSummary(), null)).toMatchObject({ unit: '%', remark: '8 fixes' });
    expect(figure('rejected', makeSummary(), null).value).toBeCloseTo((100 * 8) / 11_808, 9);
  });

  it('lag 1 is the worst channel, named, against its band', () => {
    expect(figure('lag1', makeSummary(), null)).toMatchObject({
      value: -0.06,
      verdict: 'attention',
      remark: 'velocity east, band ±0.026',
    });
  });

  it('has dashes and no verdict before the first run', () => {
    for (const one of headlineFigures(null, null)) {
      expect(one.value).toBeNull();
      expect(one.verdict).toBe('plain');
      expect(one.change).toBeNull();
    }
  });
});
