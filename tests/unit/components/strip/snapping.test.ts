import { snapTime } from '@/components/strip/snapping';
import { WITHHELD, withholdOptions } from '@/components/strip/window-kinds';
import { whatRunsHave } from '@/components/bench/use-strip-choices';
import { parametersSchema } from '@/shared/contracts/parameters';
import { withholdSchema } from '@/shared/contracts/runs';

const snap = (timeS: number, more: Partial<Parameters<typeof snapTime>[0]> = {}) =>
  snapTime({ timeS, stepS: 1, others: [], reachS: 3, epochsS: [], ...more });
/** At 5 Hz, 30 ms after the whole seconds. */
const epochsS = Array.from({ length: 500 }, (_, i) => 0.03 + i / 5);

describe('a dragged time', () => {
  it('rests at whole seconds', () => {
    expect(snap(41.6)).toBe(42);
    expect(snap(41.66, { stepS: 0.1 })).toBe(41.7);
  });

  it('rests at the fix nearest to the whole second', () => {
    expect(snap(41.6, { epochsS })).toBe(42.03);
    expect(snap(41.64, { stepS: 0.1, epochsS })).toBe(41.63);
    expect(snap(500.2, { epochsS })).toBe(500);
  });

  it('is drawn to the edge of another window that is near', () => {
    const others = [{ startS: 45.2, endS: 60.7 }];
    expect(snap(43.9, { others, epochsS })).toBe(45.2);
    expect(snap(63.1, { others, epochsS })).toBe(60.7);
    expect(snap(42.1, { others })).toBe(42);
  });

  it('stays where it is when nothing is snapped', () => {
    expect(snap(41.6183, { stepS: 0, epochsS, others: [{ startS: 41.6, endS: 50 }] })).toBe(41.618);
  });
});

describe('what can be withheld', () => {
  const health = { gnss: { hasVelocity: true } } as Parameters<typeof whatRunsHave>[0];

  it('is GNSS and its parts, and the aids that are on', () => {
    expect(whatRunsHave(health, parametersSchema.parse({}))).toEqual(['gnss', 'position', 'velocity']);
    const parameters = parametersSchema.parse({
      aids: { barometer: { enabled: true }, zeroVelocity: { enabled: true } },
    });
    expect(whatRunsHave(health, parameters)).toEqual([
      'gnss',
      'position',
      'velocity',
      'zero-velocity',
      'barometer',
    ]);
  });

  it('is GNSS alone where it measures no velocity', () => {
    const still = { gnss: { hasVelocity: false } } as Parameters<typeof whatRunsHave>[0];
    expect(whatRunsHave(still, parametersSchema.parse({}))).toEqual(['gnss']);
  });

  it('is every one of the contract when all are on', () => {
    const on = { enabled: true };
    const parameters = parametersSchema.parse({
      aids: {
        zeroVelocity: on,
        zeroRotation: on,
        nonHolonomic: on,
        barometer: on,
        heading: on,
        odometer: on,
        attitude: on,
      },
    });
    expect(whatRunsHave(health, parameters).sort()).toEqual([...withholdSchema.options].sort());
  });

  it('still shows what a window withholds when its aid has been switched off since', () => {
    expect(withholdOptions(['gnss'], 'odometer').map(({ label }) => label)).toEqual([
      'All GNSS',
      'The odometer',
    ]);
    expect(WITHHELD.odometer).toBe('the odometer');
  });
});
