import fc from 'fast-check';
import { axesFrom, axesSentence, crossAxis, downOptions, SIGNED_AXES } from '@/components/vehicles/axes';
import { axisDeterminant, IDENTITY_AXES } from '@/shared/contracts/vehicles';

test('whatever forward and down are chosen, the frame is right-handed', () => {
  const axis = fc.constantFrom(...SIGNED_AXES);
  fc.assert(
    fc.property(axis, axis, (forward, down) => {
      const axes = axesFrom(forward, down);
      expect(axes.forward).toBe(forward);
      expect(axisDeterminant(axes)).toBe(1);
    }),
    { seed: 11 },
  );
});

test('down is kept when it can be', () => {
  for (const forward of SIGNED_AXES)
    for (const down of downOptions(forward)) expect(axesFrom(forward, down).down).toBe(down);
});

test('forward × right = down in the sensor’s own axes', () => {
  const { forward, right, down } = axesFrom('-y', '+z');
  expect(crossAxis(forward, right)).toBe(down);
});

test('two axes along one line have no cross product', () => {
  expect(() => crossAxis('+x', '-x')).toThrow(RangeError);
});

test.each([
  [IDENTITY_AXES, 'x forward, y right, z down'],
  [axesFrom('+x', '-z'), 'x forward, y left, z up'],
  [axesFrom('+y', '-z'), 'x right, y forward, z up'],
])('says how the sensor sits (%#)', (axes, sentence) => {
  expect(axesSentence(axes)).toBe(sentence);
});
