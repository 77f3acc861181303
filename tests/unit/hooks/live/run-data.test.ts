import { RunData } from '@/hooks/live/run-data';
import { makeFrame } from './frames';

describe('RunData', () => {
  it('grows by the rows of each frame, in order', () => {
    const data = new RunData('a');
    expect(data.append(makeFrame('a', 0, { state: [0, 1, 2] }))).toBe('appended');
    expect(data.append(makeFrame('a', 1, { state: [3, 4], position: [3.5] }))).toBe('appended');
    const { length } = data.table('state');
    expect(Array.from(data.column('state', 'time_s').subarray(0, length))).toEqual([0, 1, 2, 3, 4]);
    expect(Array.from(data.column('state', 'yaw_deg').subarray(0, length))).toEqual([0, 0, 0, 1, 1]);
    expect(data.table('position').length).toBe(1);
  });

  it('keeps every row when it outgrows its room many times', () => {
    const data = new RunData('a');
    for (let seq = 0; seq < 40; seq++)
      data.append(makeFrame('a', seq, { state: Array.from({ length: 100 }, (_, i) => seq * 100 + i) }));
    const { length } = data.table('state');
    expect(length).toBe(4000);
    expect(data.column('state', 'time_s')[3999]).toBe(3999);
    expect(data.column('state', 'north_m')[3950]).toBe(39);
  });

  it('ignores frames of another run and repeated ones', () => {
    const data = new RunData('a');
    data.append(makeFrame('a', 0, { state: [0, 1] }));
    expect(data.append(makeFrame('b', 1, { state: [2] }))).toBe('ignored');
    expect(data.append(makeFrame('a', 0, { state: [0, 1] }))).toBe('ignored');
    expect(data.table('state').length).toBe(2);
  });

  it('tells a gap and marks the hole', () => {
    const data = new RunData('a');
    data.append(makeFrame('a', 0, { state: [0] }));
    expect(data.append(makeFrame('a', 3, { state: [9] }))).toBe('gap');
    expect(data.holed).toBe(true);
    expect(data.table('state').length).toBe(2);
  });

  it('has a hole too when its first frame was missed', () => {
    const data = new RunData('a');
    expect(data.append(makeFrame('a', 1, { state: [5] }))).toBe('gap');
  });

  it('is whole again after the fetched series, and goes on without repeating rows', () => {
    const data = new RunData('a');
    data.append(makeFrame('a', 0, { state: [0] }));
    data.append(makeFrame('a', 3, { state: [9] }));
    data.replace(makeFrame('a', 0, { state: [0, 3, 6, 9] }), false);
    expect(data.holed).toBe(false);
    data.append(makeFrame('a', 4, { state: [6, 9, 12] }));
    const times = Array.from(data.column('state', 'time_s').subarray(0, data.table('state').length));
    expect(times).toEqual([0, 3, 6, 9, 9, 12]);
    expect(data.complete).toBe(false);
    data.replace(makeFrame('a', 0, { state: [0, 50, 100] }), true);
    expect([data.complete, data.progress]).toEqual([true, 1]);
  });
});
