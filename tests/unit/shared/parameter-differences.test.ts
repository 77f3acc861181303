import { defaultParameters, type Parameters, parametersSchema } from '@/shared/contracts/parameters';
import { parameterDifferences } from '@/shared/parameters/parameter-differences';
import { parameterAt } from '@/shared/parameters/parameter-list';
import { RAD_PER_DEG } from '@/shared/units';

const leaves = (value: object, prefix = ''): string[] =>
  Object.entries(value).flatMap(([key, inner]: [string, unknown]) =>
    typeof inner === 'object' && inner !== null && !Array.isArray(inner)
      ? leaves(inner, `${prefix}${key}.`)
      : [prefix + key],
  );

describe('the list of parameters', () => {
  it('names every one that has a default, and knows no other', () => {
    const unnamed = leaves(defaultParameters()).filter((path) => !parameterAt(path));
    expect(unnamed).toEqual([]);
    expect(parameterAt('gyro.whiteNoise')).toBeUndefined();
  });
});

describe('differences of parameters', () => {
  const changed = (input: object): Parameters => parametersSchema.parse(input);

  it('are none between the same', () => {
    expect(parameterDifferences(defaultParameters(), defaultParameters())).toEqual([]);
  });

  it('give names, display units and percent, in the order of the bench', () => {
    const from = changed({ gyro: { whiteNoiseRadPerSqrtS: 1e-4 }, gnss: { latencyS: 0 } });
    const to = changed({
      gyro: { whiteNoiseRadPerSqrtS: 1.5e-4 },
      gnss: { latencyS: 0.1, usePosition: false },
    });
    const found = parameterDifferences(from, to);
    expect(found.map(({ path }) => path)).toEqual([
      'gyro.whiteNoiseRadPerSqrtS',
      'gnss.usePosition',
      'gnss.latencyS',
    ]);
    const [noise, used, latency] = found;
    expect(noise).toMatchObject({ group: 'Gyro', label: 'White noise (ARW)', unit: '°/√h' });
    expect(noise!.before).toBeCloseTo((1e-4 * 60) / RAD_PER_DEG, 12);
    expect(noise!.percent).toBeCloseTo(50, 9);
    expect(used).toMatchObject({ before: 'on', after: 'off', percent: null });
    expect(latency).toMatchObject({ before: 0, after: 0.1, unit: 's', percent: null });
  });

  it('tell what is set and what is no longer set', () => {
    const armed = changed({ leverArmM: [1.2, 0, -0.6] });
    const [set] = parameterDifferences(defaultParameters(), armed);
    expect(set).toMatchObject({ path: 'leverArmM', before: null, after: '1.200, 0, −0.6000', unit: 'm' });
    const [unset] = parameterDifferences(armed, defaultParameters());
    expect(unset).toMatchObject({ before: '1.200, 0, −0.6000', after: null });
  });

  it('take percent of the size of a negative value', () => {
    const [latency] = parameterDifferences(
      changed({ gnss: { latencyS: -0.2 } }),
      changed({ gnss: { latencyS: -0.1 } }),
    );
    expect(latency!.percent).toBeCloseTo(50, 9);
  });
});
