/** Stands still, a little askew. */
import { newKinematics, type Motion } from '../motion';

export function staticMotion(yaw: number, roll = 0.015, pitch = -0.025): Motion {
  const still = { ...newKinematics(), roll, pitch, yaw };
  return { kind: 'static', evaluate: (_t, out) => void Object.assign(out, still), bandwidthHz: 0.1 };
}
