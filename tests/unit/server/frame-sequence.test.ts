import { encodeFrame } from '@/shared/contracts/frames';
import { frameSequence } from '@/server/services/frame-sequence';

describe('a frame’s number', () => {
  const head = {
    runId: 'r',
    seq: 17,
    progress: 0.5,
    toS: 2,
    extentS: [0, 4] as [number, number],
    origin: { latDeg: 47.21, lonDeg: -14.63, heightM: 40 },
  };

  it('is read without its columns, wherever the frame lies in its buffer', () => {
    const frame = encodeFrame({ head, tables: {} });
    expect(frameSequence(frame)).toBe(17);
    const shifted = new Uint8Array(frame.length + 3);
    shifted.set(frame, 3);
    expect(frameSequence(shifted.subarray(3))).toBe(17);
  });
});
