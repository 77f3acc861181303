/** Signed sensor axes as mounted, kept right-handed by construction. */
import { axisRow, type AxisMap, type SignedAxis } from '@/shared/contracts/vehicles';

export const SIGNED_AXES: readonly SignedAxis[] = ['+x', '-x', '+y', '-y', '+z', '-z'];

/** "+x" → "+x", "-x" → "−x" with a true minus. */
export const axisName = (axis: SignedAxis): string => axis.replace('-', '−');

/** The sensor axis along a × b. */
export function crossAxis(a: SignedAxis, b: SignedAxis): SignedAxis {
  const [p, q] = [axisRow(a), axisRow(b)];
  const product = [p[1] * q[2] - p[2] * q[1], p[2] * q[0] - p[0] * q[2], p[0] * q[1] - p[1] * q[0]] as const;
  const found = SIGNED_AXES.find((axis) => axisRow(axis).every((value, i) => value === product[i]));
  if (!found) throw new RangeError(`${a} and ${b} lie along one line.`);
  return found;
}

/** Axes that may point down once forward is taken. */
export const downOptions = (forward: SignedAxis): SignedAxis[] =>
  SIGNED_AXES.filter((axis) => axis[1] !== forward[1]);

/** Forward and down as given, right as it must then be; down is moved out of the way when both lie along one line. */
export function axesFrom(forward: SignedAxis, down: SignedAxis): AxisMap {
  const free = down[1] === forward[1] ? downOptions(forward).at(-2)! : down;
  return { forward, right: crossAxis(free, forward), down: free };
}

/** Where each positive sensor axis points on the vehicle: +1 or −1 along forward, right or down. */
export function sensorDirections(
  axes: AxisMap,
): Record<'x' | 'y' | 'z', { along: keyof AxisMap; sign: 1 | -1 }> {
  const find = (letter: 'x' | 'y' | 'z') => {
    const along =
      (['forward', 'right', 'down'] as const).find((side) => axes[side][1] === letter) ?? 'forward';
    return { along, sign: axes[along][0] === '-' ? (-1 as const) : (1 as const) };
  };
  return { x: find('x'), y: find('y'), z: find('z') };
}

/** "x forward, y left, z up" */
export function axesSentence(axes: AxisMap): string {
  const directions = sensorDirections(axes);
  return (['x', 'y', 'z'] as const)
    .map((letter) => `${letter} ${WORDS[directions[letter].along][directions[letter].sign]}`)
    .join(', ');
}

const WORDS: Record<keyof AxisMap, Record<1 | -1, string>> = {
  forward: { 1: 'forward', [-1]: 'backward' },
  right: { 1: 'right', [-1]: 'left' },
  down: { 1: 'down', [-1]: 'up' },
};
