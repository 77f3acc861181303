import { matchClocks } from '@/workers/engine/motion-match/match-clocks';
import type { GnssColumns } from '@/workers/engine/types';
import { drive, integrals } from './support';

jest.setTimeout(60_000);

const between = (gnss: GnssColumns, fromS: number, toS: number): GnssColumns => {
  const rows = [...gnss.timeS.keys()].filter((j) => gnss.timeS[j]! >= fromS && gnss.timeS[j]! <= toS);
  const part = (column: Float64Array) => Float64Array.from(rows, (j) => column[j]!);
  const parts = <T extends readonly Float64Array[]>(columns: T) => columns.map(part) as unknown as T;
  return {
    ...gnss,
    timeS: part(gnss.timeS),
    latRad: part(gnss.latRad),
    lonRad: part(gnss.lonRad),
    heightM: part(gnss.heightM),
    velocityNed: parts(gnss.velocityNed),
    positionSigma: parts(gnss.positionSigma),
    velocitySigma: parts(gnss.velocitySigma),
  };
};
const movedBy = (gnss: GnssColumns, byS: number): GnssColumns => ({
  ...gnss,
  timeS: gnss.timeS.map((t) => t - byS),
});

test.each([
  ['a road drive beside UNIX time', 'road', -1.7e9, 0.1],
  ['a road drive, the receiver started a quarter of an hour earlier', 'road', 900, 0.1],
  ['a multirotor, which turns little and leans instead', 'multirotor', 497.123, 0.15],
  ['a crawler', 'crawler', -12_345.678, 0.5],
] as const)('%s: found whatever the clocks say', (_, motion, offsetS, withinS) => {
  const { imu, gnss } = drive({ motion, seed: 3 });
  const found = matchClocks(integrals(imu), movedBy(gnss, offsetS))!;
  expect(Math.abs(found.offsetS - offsetS)).toBeLessThan(withinS);
  expect(Math.abs(found.offsetS - offsetS)).toBeLessThan(4 * found.sigmaS);
});

test('logs that overlap only in part are laid over one another', () => {
  const { imu, gnss } = drive({ seed: 4 });
  const found = matchClocks(integrals(imu), movedBy(between(gnss, 100, 240), 5000))!;
  expect(Math.abs(found.offsetS - 5000)).toBeLessThan(0.2);
});

test.each([1, 2, 3])('logs of two different drives (%d) are not forced together', (seed) => {
  const { imu } = drive({ seed });
  const { gnss } = drive({ seed: seed + 50, motion: 'crawler' });
  expect(matchClocks(integrals(imu), movedBy(gnss, 5000))).toBeNull();
});

test('a vehicle at rest tells nothing', () => {
  const { imu, gnss } = drive({ motion: 'static', seed: 5 });
  expect(matchClocks(integrals(imu), movedBy(gnss, 700))).toBeNull();
});
