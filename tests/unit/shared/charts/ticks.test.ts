import { formatAxisTime, logMarks, timeTicks, valueTicks } from '@/shared/charts/model/ticks';

describe('timeTicks', () => {
  it.each([
    [0, 1240, 7, ['0:00', '5:00', '10:00', '15:00', '20:00']],
    [300, 620, 6, ['5:00', '6:00', '7:00', '8:00', '9:00', '10:00']],
    [10, 11, 5, ['0:10.0', '0:10.2', '0:10.4', '0:10.6', '0:10.8', '0:11.0']],
    [0, 14_400, 5, ['0:00', '1:00:00', '2:00:00', '3:00:00', '4:00:00']],
  ])('rules %f…%f s at round clock times', (from, to, most, labels) => {
    expect(timeTicks(from, to, most).map((tick) => tick.label)).toEqual(labels);
  });

  it('has none where there is no span', () => expect(timeTicks(5, 5, 4)).toEqual([]));
});

describe('formatAxisTime', () => {
  it('carries a rounded fraction into the seconds', () => {
    expect(formatAxisTime(59.9999, 0.1)).toBe('1:00.0');
    expect(formatAxisTime(-0.25, 0.05)).toBe('−0:00.25');
  });
});

describe('valueTicks', () => {
  it.each([
    [-3, 3, 3, ['−2', '0', '2']],
    [0, 0.02, 4, ['0.000', '0.005', '0.010', '0.015', '0.020']],
    [0, 50, 3, ['0', '20', '40']],
  ])('labels %f…%f with one number of decimals', (low, high, count, labels) => {
    expect(valueTicks(low, high, count).map((tick) => tick.label)).toEqual(labels);
  });
});

describe('logMarks', () => {
  it('rules 1-2-5 and marks decades', () => {
    expect(logMarks(0.02, 1).map((mark) => mark.value)).toEqual([0.02, 0.05, 0.1, 0.2, 0.5, 1]);
    expect(
      logMarks(0.02, 1)
        .filter((mark) => mark.major)
        .map((mark) => mark.value),
    ).toEqual([0.1, 1]);
  });
});
