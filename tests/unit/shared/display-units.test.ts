import { defaultParameters } from '@/shared/contracts/parameters';
import { chosenUnit, displayUnit, scaleOf } from '@/shared/display-units';
import { PARAMETER_LIST } from '@/shared/parameters/parameter-list';
import { readPath } from '@/shared/parameters/parameter-path';
import { shownValue, unitSymbol } from '@/shared/parameters/parameter-words';
import { RAD_PER_DEG } from '@/shared/units';

const field = (path: string) => PARAMETER_LIST.find((one) => one.path === path)!;

test.each([
  ['angleRandomWalk', '°/s/√Hz', RAD_PER_DEG, 1, '°/s/√Hz'],
  ['gyroBias', 'rad/s', 0.25, 0.25, 'rad/s'],
  ['accelBias', 'm/s²', 9.80665, 9.80665, 'm/s²'],
  ['accelBias', undefined, 9.80665, 1000, 'mg'],
  ['angle', 'mrad', 0.002, 2, 'mrad'],
  ['length', 'ft', 0.3048, 1, 'ft'],
  ['speed', 'kn', 1852 / 3600, 1, 'kn'],
] as const)('%s in %s', (quantity, chosen, si, value, symbol) => {
  const scale = scaleOf(quantity, { [quantity]: chosen });
  expect(scale.symbol).toBe(symbol);
  expect(si * scale.factor).toBeCloseTo(value, 9);
});

test('a symbol that the quantity does not have counts as not chosen', () => {
  expect(chosenUnit('speed', { speed: 'mg' })).toBeNull();
  expect(displayUnit('speed', { speed: 'mg' }).symbol).toBe('m/s');
});

test('a raw number in degrees is shown in milliradians', () => {
  const { symbol, factor } = scaleOf('angle', { angle: 'mrad' }, RAD_PER_DEG);
  expect([symbol, 180 * factor]).toEqual(['mrad', expect.closeTo(1000 * Math.PI, 9)]);
});

test('parameters follow the choice; a field with a unit of its own keeps it until one is chosen', () => {
  const noise = field('gyro.whiteNoiseRadPerSqrtS');
  const si = readPath(defaultParameters(), noise.path) as number;
  expect(shownValue(noise, si, { angleRandomWalk: 'rad/√s' })).toBe(si);
  expect(unitSymbol(noise, { angleRandomWalk: 'rad/√s' })).toBe('rad/√s');
  const range = field('clipping.gyroRangeRadPerS');
  expect(unitSymbol(range)).toBe('°/s');
  expect(unitSymbol(range, { gyroBias: 'rad/s' })).toBe('rad/s');
  expect(shownValue(field('leverArmM'), [0.3048, 0, -0.6096], { length: 'ft' })).toBe('1.000, 0, −2.000');
});
