import { SLIDERS } from '@/shared/parameters/parameter-specs';
import { readNumber, writePath } from '@/shared/parameters/parameter-path';
import { fractionOf, parseTyped, sliderKey, valueAt } from '@/components/bench/slider-model';
import { defaultParameters } from '@/shared/contracts/parameters';
import { defaultUnit, fromDisplay, toDisplay } from '@/shared/units';

const arw = SLIDERS.find((spec) => spec.path === 'gyro.whiteNoiseRadPerSqrtS')!;
const unit = defaultUnit(arw.quantity);
const shown = (value: number) => Number(toDisplay(value, unit).toPrecision(6));
const si = (value: number) => fromDisplay(value, unit);

describe('the logarithmic rule', () => {
  it('puts equal factors at equal distances', () => {
    const at = (value: number) => fractionOf(si(value), arw.range);
    expect(at(0.2) - at(0.02)).toBeCloseTo(at(2) - at(0.2), 9);
    expect([at(0.002), at(20)]).toEqual([0, 1]);
    expect(at(0.2)).toBeCloseTo(0.5, 9);
  });

  it('holds what lies beyond its ends', () => {
    expect(fractionOf(si(500), arw.range)).toBe(1);
    expect(fractionOf(si(1e-9), arw.range)).toBe(0);
    expect(shown(valueAt(1.7, arw.range, unit))).toBe(20);
  });

  it('gives what it shows: three digits in the unit on screen', () => {
    for (let i = 0; i <= 50; i++) {
      const value = shown(valueAt(i / 50, arw.range, unit));
      expect(Number(value.toPrecision(3))).toBe(value);
    }
  });

  it('comes back to where it was, to the width of three digits', () => {
    for (const value of [0.0123, 0.299, 4.56, 19.9])
      expect(shown(valueAt(fractionOf(si(value), arw.range), arw.range, unit))).toBe(value);
  });
});

describe('keys', () => {
  const press = (value: number, key: string, shift = false, home = si(0.5)) => {
    const next = sliderKey(si(value), arw.range, unit, key, shift, home);
    return next === null ? null : shown(next);
  };

  it.each([
    ['ArrowRight', 0.3, 0.337],
    ['ArrowUp', 0.3, 0.337],
    ['ArrowLeft', 0.3, 0.267],
    ['PageUp', 0.3, 0.5],
    ['PageUp', 0.5, 1],
    ['PageDown', 0.3, 0.2],
    ['PageDown', 0.2, 0.1],
    ['Home', 0.3, 0.002],
    ['End', 0.3, 20],
    ['Backspace', 0.3, 0.5],
    ['ArrowRight', 20, 20],
    ['a', 0.3, null],
  ])('%s from %f gives %p', (key, from, to) => expect(press(from, key)).toBe(to));

  it('shift is fine, and always moves at least the last digit', () => {
    expect(press(0.3, 'ArrowRight', true)).toBe(0.307);
    expect(press(1, 'ArrowLeft', true)).toBe(0.977);
    let value = 0.3;
    for (let i = 0; i < 20; i++) value = press(value, 'ArrowRight', true)!;
    expect(value).toBeGreaterThan(0.45);
  });
});

describe('typed values', () => {
  const typed = (text: string) => parseTyped(text, arw.quantity, unit, arw.range);
  const valueOf = (text: string) => {
    const result = typed(text);
    return 'value' in result ? shown(result.value) : result.message;
  };

  it.each([
    ['0.32', 0.32],
    ['0,32', 0.32],
    ['.5', 0.5],
    ['0.32 °/√h', 0.32],
    ['0.32 deg/sqrt(h)', 0.32],
    ['3.2e-1', 0.32],
    ['8.7e-5 rad/√s', 0.299084],
    ['0.005 °/s/√Hz', 0.3],
  ])('%s is %f °/√h', (text, value) => expect(valueOf(text)).toBeCloseTo(value, 5));

  it('says what is wrong and what to do', () => {
    expect(valueOf('much')).toMatch(/Type a number.*°\/√h/);
    expect(valueOf('0.3 m/s')).toMatch(/“m\/s” is not a unit of this: use °\/√h/);
    expect(valueOf('900')).toBe('Between 0.00200 and 20.0 °/√h.');
    expect(valueOf('-1')).toMatch(/^Between/);
  });
});

describe('every slider', () => {
  const defaults = defaultParameters();

  it.each(SLIDERS.map((spec) => [spec.path, spec] as const))(
    '%s spans its default, and the contract takes its ends',
    (path, spec) => {
      const value = readNumber(defaults, path);
      expect(value).toBeGreaterThan(spec.range.low);
      expect(value).toBeLessThan(spec.range.high);
      for (const end of [spec.range.low, spec.range.high])
        expect(readNumber(writePath(defaults, path, end), path)).toBe(end);
    },
  );
});
