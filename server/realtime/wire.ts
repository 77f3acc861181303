/** The driver sends Node's Buffer as binary; a browser receives it as the ArrayBuffer that the contract names. */
export function frameForWire(frame: Uint8Array): ArrayBuffer {
  return Buffer.from(frame.buffer, frame.byteOffset, frame.byteLength) as unknown as ArrayBuffer;
}
