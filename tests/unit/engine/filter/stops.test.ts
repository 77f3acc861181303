import { defaultParameters } from '@/shared/contracts/parameters';
import { align } from '@/workers/engine/alignment/align';
import { ErrorStateFilter } from '@/workers/engine/filter/error-state-filter';
import { prepareFixes, withheldBy } from '@/workers/engine/filter/fixes';
import { StopDetector } from '@/workers/engine/filter/stop-detector';
import { StopEvidence } from '@/workers/engine/filter/stop-evidence';
import { lowerBound } from '@/workers/engine/run/windows';
import { simulateCase } from '../support/monte-carlo';

jest.setTimeout(30_000);

describe('evidence of a stop', () => {
  const fresh = () => new StopEvidence(defaultParameters().aids.stopDetection);

  test('a vehicle that was never known to move stands where its speed may be zero and is known', () => {
    const evidence = fresh();
    expect(evidence.bearsOut(5, 0.1, 0.2)).toBe(true);
    expect(evidence.bearsOut(5, 0.6, 0.05)).toBe(false);
    expect(evidence.bearsOut(5, 0.6, 0.3)).toBe(true);
    expect(evidence.bearsOut(5, 0.1, 2)).toBe(false);
  });

  test('a GNSS velocity that says it moves holds for two seconds; one that says it stands ends that', () => {
    const evidence = fresh();
    evidence.addFix(10, 8, 0.1, true);
    expect(evidence.bearsOut(11.9, 0.1, 0.1)).toBe(false);
    expect(evidence.bearsOut(12.1, 0.1, 0.1)).toBe(true);
    evidence.addFix(13, 0.2, 0.1, true);
    expect(evidence.bearsOut(13.5, 0.1, 0.1)).toBe(true);
  });

  test('after motion the braking must show beyond its uncertainty', () => {
    const evidence = fresh();
    evidence.addFix(10, 8, 0.1, true);
    // Zero is possible, but so is that nothing changed.
    expect(evidence.bearsOut(60, 2, 2.5)).toBe(false);
    expect(evidence.bearsOut(60, 0.5, 1)).toBe(true);
    evidence.stopped();
    expect(evidence.bearsOut(61, 0.5, 1)).toBe(false);
    evidence.addEstimate(5, 0.2);
    expect(evidence.bearsOut(70, 0.3, 0.6)).toBe(true);
    const copy = fresh();
    copy.restore(evidence.save());
    expect(copy.save()).toEqual(evidence.save());
  });
});

describe('on smooth roads, where steady driving is as quiet as a stop', () => {
  /** Zero-velocity updates by what the vehicle truly did, and how many quiet windows there were. */
  function drive(seed: number, outages: readonly (readonly [number, number])[]) {
    const simulated = simulateCase(
      { motion: 'road', durationS: 260, imuRateHz: 50, staticStartS: 40, seed },
      { aids: { zeroVelocity: { enabled: true } } },
    );
    const { recording, parameters, scenario } = simulated;
    const { imu, gnss, reference } = recording;
    const fixes = prepareFixes(gnss, parameters.gnss);
    const withheld = withheldBy(fixes, outages.map(([startS, endS]) => ({ startS, endS, withhold: 'gnss' }))); // prettier-ignore
    const moves = (timeS: number) => {
      const k = Math.min(lowerBound(reference.timeS, timeS), reference.timeS.length - 1);
      return Math.hypot(...reference.velocityNed.map((axis) => axis[k]!)) > 0.5;
    };
    const count = { used: 0, falselyUsed: 0, quiet: 0, falselyQuiet: 0 };
    const filter = new ErrorStateFilter(imu, fixes, withheld, parameters, scenario.leverArmM, {
      onInnovation: (group, timeS, _axes, _update, accepted) => {
        if (group !== 'zero-velocity' || !accepted) return;
        count[moves(timeS) ? 'falselyUsed' : 'used'] += 1;
      },
      onWarning: () => undefined,
    });
    const { sample, fix, nav, p } = align(imu, fixes, parameters, scenario.leverArmM);
    filter.start(sample, fix, nav, p);
    const detector = new StopDetector(imu, parameters.aids.stopDetection);
    while (filter.sample < imu.timeS.length - 1) {
      filter.advanceSample();
      if (detector.add(filter.sample) && detector.isStill)
        count[moves(filter.timeS) ? 'falselyQuiet' : 'quiet'] += 1;
    }
    return count;
  }

  test.each([
    ['with GNSS throughout', []],
    ['in outages of 60 and 90 s', [[60, 120], [150, 240]]], // prettier-ignore
  ] as const)('no false stop is used, true ones are: %s', (_name, outages) => {
    const total = { used: 0, falselyUsed: 0, quiet: 0, falselyQuiet: 0 };
    for (let seed = 1; seed <= 10; seed += 1) {
      const count = drive(seed, outages);
      for (const key of ['used', 'falselyUsed', 'quiet', 'falselyQuiet'] as const) total[key] += count[key];
    }
    expect(total.falselyQuiet).toBeGreaterThan(300);
    expect(total.falselyUsed).toBe(0);
    expect(total.used).toBeGreaterThan(0.85 * total.quiet);
  });
});
