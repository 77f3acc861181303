/** Changes of a channel map that a finding offers. Each answers the part that takes the place of the one in force. */
import type { ChannelMap, GyroUnit, AccelUnit, ImuMap } from '@/shared/contracts/recordings';
import { axisDeterminant, axisRow, type AxisMap, type SignedAxis } from '@/shared/contracts/vehicles';
import type { TrueAxes } from '../engine/motion-match/body-axes';

/** The map that a recording was decoded with, and the axes that applied. */
export interface MapInForce {
  map: ChannelMap;
  axes: AxisMap;
}

const imuOf = ({ map }: MapInForce): ImuMap => map.imu!;

export const withAccelUnit = (of: MapInForce, unit: AccelUnit): ChannelMap => ({
  imu: { ...imuOf(of), accel: { ...imuOf(of).accel, unit } },
});

export const withGyroUnit = (of: MapInForce, unit: GyroUnit): ChannelMap => ({
  imu: { ...imuOf(of), gyro: { ...imuOf(of).gyro, unit } },
});

export function withAccelSign(of: MapInForce): ChannelMap {
  const { accel } = imuOf(of);
  const sign = accel.sign === 'opposite' ? 'specific-force' : 'opposite';
  return { imu: { ...imuOf(of), accel: { ...accel, sign } } };
}

/** Turns the gyro column round that now stands for body axis `axis` (0, 1, 2). */
export function withGyroTurned(of: MapInForce, axis: number): ChannelMap {
  const { gyro } = imuOf(of);
  const column = axisRow([of.axes.forward, of.axes.right, of.axes.down][axis]!).findIndex(
    (part) => part !== 0,
  );
  const signs = [0, 1, 2].map((i) => (gyro.signs?.[i] ?? 1) * (i === column ? -1 : 1));
  return { imu: { ...imuOf(of), gyro: { ...gyro, signs: signs as [1, 1, 1] } } };
}

/** The GNSS file's times moved by `byS`. */
export function withGnssShift({ map }: MapInForce, byS: number): ChannelMap {
  const gnss = map.gnss!;
  // Milliseconds: what the motion tells is not finer.
  const offsetS = Math.round((gnss.time.offsetS + byS) * 1000) / 1000;
  return { gnss: { ...gnss, time: { ...gnss.time, offsetS } } };
}

/**
 * Axes so that the body is as the motion says. Where that takes a mirror (two columns exchanged, one turned round) no
 * mounting explains it: the columns themselves are put right.
 */
export function withTrueAxes(of: MapInForce, truth: TrueAxes): ChannelMap {
  const now = [of.axes.forward, of.axes.right, of.axes.down];
  const [forward, right, down] = truth.map(({ axis, sign }) => turned(now[axis]!, sign)) as [
    SignedAxis,
    SignedAxis,
    SignedAxis,
  ];
  const axes: AxisMap = { forward, right, down };
  if (axisDeterminant(axes) === 1) return { imu: { ...imuOf(of), axes } };
  return { imu: { ...withColumns(imuOf(of), of.axes, axes), axes: of.axes } };
}

/** Columns exchanged and turned so that `was` applied to them gives what `wanted` gave before. */
function withColumns(imu: ImuMap, was: AxisMap, wanted: AxisMap): ImuMap {
  const rows = (axes: AxisMap) => [axes.forward, axes.right, axes.down].map(axisRow);
  const [a, b] = [rows(was), rows(wanted)];
  // was · C = wanted with C a signed permutation, and was orthogonal: C = wasᵀ · wanted.
  const c = [0, 1, 2].map((i) =>
    [0, 1, 2].map((j) => [0, 1, 2].reduce((sum, k) => sum + a[k]![i]! * b[k]![j]!, 0)),
  );
  const from = c.map((row) => row.findIndex((part) => part !== 0));
  const reorder = <S extends ImuMap['gyro'] | ImuMap['accel']>(sensor: S): S => ({
    ...sensor,
    columns: from.map((j) => sensor.columns[j]!) as S['columns'],
    signs: from.map((j, i) => c[i]![j]! * (sensor.signs?.[j] ?? 1)) as [1, 1, 1],
  });
  return { ...imu, gyro: reorder(imu.gyro), accel: reorder(imu.accel) };
}

const turned = (axis: SignedAxis, sign: 1 | -1): SignedAxis =>
  sign === 1 ? axis : (`${axis[0] === '-' ? '+' : '-'}${axis[1]!}` as SignedAxis);
