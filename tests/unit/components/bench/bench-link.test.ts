import { applyChanges, benchHref, readBenchQuery, type BenchLink } from '@/components/bench/bench-link';
import { differences, readPath } from '@/shared/parameters/parameter-path';
import { defaultParameters, parametersSchema } from '@/shared/contracts/parameters';

const recordingId = '7c1e0c1e-0000-4000-8000-000000000001';

/** What the page gets back of an address. */
function reopened(link: BenchLink) {
  const url = new URL(`http://localhost${benchHref(link)}`);
  return readBenchQuery(url.pathname.split('/')[2]!, Object.fromEntries(url.searchParams));
}

describe('a link', () => {
  it('opens the same view again', () => {
    const link: BenchLink = {
      recordingId,
      setId: '7c1e0c1e-0000-4000-8000-000000000002',
      version: 6,
      changes: [
        { path: 'gyro.whiteNoiseRadPerSqrtS', value: 9.3e-5 },
        { path: 'gyro.biasModel', value: 'gauss-markov' },
        { path: 'gnss.useVelocity', value: false },
        { path: 'leverArmM', value: [0.42, -0.05, -0.88] },
        { path: 'initial.headingDeg', value: null },
      ],
      windows: [
        { startS: 412, endS: 472, withhold: 'gnss' },
        { startS: 600.5, endS: 630, withhold: 'position' },
        { startS: 700, endS: 760, withhold: 'velocity' },
      ],
      baselineRunId: '7c1e0c1e-0000-4000-8000-000000000003',
      options: { smooth: true, errorBudget: false },
      view: 'track',
    };
    expect(reopened(link)).toEqual({ link, problems: [] });
  });

  it('is short where there is nothing to say', () => {
    expect(benchHref({ recordingId })).toBe(`/bench/${recordingId}`);
    expect(benchHref({ recordingId, changes: [] })).toBe(`/bench/${recordingId}`);
  });

  it('tells "no windows" from "the windows of the version"', () => {
    expect(reopened({ recordingId, windows: [] }).link.windows).toEqual([]);
    expect(reopened({ recordingId }).link.windows).toBeUndefined();
  });

  it('leaves out windows that cannot be read, and says so', () => {
    for (const w of ['nonsense', '10~5', '10~30,20~40', '1~2x']) {
      const { link, problems } = readBenchQuery(recordingId, { w });
      expect(link.windows).toBeUndefined();
      expect(problems).toHaveLength(1);
    }
  });
});

describe('changes', () => {
  const defaults = defaultParameters();

  it('are applied, and what the contract refuses is counted and left out', () => {
    const { parameters, refused } = applyChanges(defaults, [
      { path: 'gnss.velocityScale', value: 2.5 },
      { path: 'gnss.positionScale', value: -3 },
      { path: 'gnss.unheardOf', value: 1 },
      { path: 'gyro.biasModel', value: 'magic' },
    ]);
    expect(parameters.gnss.velocityScale).toBe(2.5);
    expect(parameters.gnss.positionScale).toBe(1);
    expect(refused).toBe(3);
    expect(parametersSchema.parse(parameters)).toEqual(parameters);
  });

  it('are found again by comparison', () => {
    const changed = applyChanges(defaults, [
      { path: 'initial.headingDeg', value: 35 },
      { path: 'accel.whiteNoiseMPerSPerSqrtS', value: 0.002 },
    ]).parameters;
    expect(differences(defaults, changed)).toEqual([
      { path: 'accel.whiteNoiseMPerSPerSqrtS', value: 0.002 },
      { path: 'initial.headingDeg', value: 35 },
    ]);
    expect(
      readPath(
        applyChanges(changed, [{ path: 'initial.headingDeg', value: null }]).parameters,
        'initial.headingDeg',
      ),
    ).toBeNull();
  });
});
