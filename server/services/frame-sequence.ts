/** Reads a frame's number without decoding its columns (layout: shared/contracts/frames.ts). */
import type { FrameHead } from '@/shared/contracts/frames';

export function frameSequence(frame: Uint8Array): number {
  const view = new DataView(frame.buffer, frame.byteOffset, frame.byteLength);
  const head = new TextDecoder().decode(frame.subarray(4, 4 + view.getUint32(0, true)));
  return (JSON.parse(head) as FrameHead).seq;
}
