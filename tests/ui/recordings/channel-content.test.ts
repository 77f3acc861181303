import { brokenAtGaps, CHANNEL_CHARTS, channelContent } from '@/components/recordings/channel-content';
import { SERIES_CHANNELS, type Series } from '@/shared/contracts/recordings';

const gyro = CHANNEL_CHARTS[0]!;
const series: Series = {
  channels: [
    { name: 'gyro_x', unit: '°/s', timeS: [0, 1, 2, 3], values: [0, 1, -4, 2] },
    { name: 'gyro_y', unit: '°/s', timeS: [0, 1, 2, 3], values: [0, null, 7, 1] },
  ],
};

test('a line stops where nothing was measured for long', () => {
  const line = brokenAtGaps({ timeS: [0, 1, 2, 20, 21], values: [1, 1, 1, 2, 2] });
  expect(Array.from({ length: line.length }, (_, i) => line.at(i))).toEqual([1, 1, 1, NaN, 2, 2]);
});

test('a chart shows the unit that the contract names for its channels', () => {
  for (const chart of CHANNEL_CHARTS)
    for (const axis of chart.axes) expect(chart.unit).toBe(SERIES_CHANNELS[axis.channel]);
});

test('the scale holds every value in view, and only those', () => {
  const { domain } = channelContent(gyro, series);
  const [low, high] = domain(0, 3);
  expect(low).toBeLessThanOrEqual(-4);
  expect(high).toBeGreaterThanOrEqual(7);
  expect(domain(0, 1)[1]).toBeLessThan(7);
});

test('without data there is a scale all the same', () => {
  expect(channelContent(gyro, undefined).domain(0, 3)).toEqual([-1, 1]);
});
