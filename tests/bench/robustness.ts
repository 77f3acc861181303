/** Prints what a filter makes of what goes wrong, against the same drive without it: `npm run bench -- robustness [seeds]`. */
import { createHash } from 'node:crypto';
import type { ParametersInput } from '@/shared/contracts/parameters';
import type { Outage } from '@/shared/contracts/runs';
import type { ScenarioInput } from '@/shared/contracts/scenarios';
import { addShock } from '@/tests/support/shock';
import { requestOf, simulateCase, type SimulatedCase } from '@/tests/unit/engine/support/monte-carlo';
import { createRun, type RunResult } from '@/workers/engine';

const seeds = Array.from({ length: Number(process.argv[2] ?? 3) }, (_, i) => i + 1);
const ROAD: ScenarioInput = { motion: 'road', durationS: 400, imuRateHz: 100, staticStartS: 20 };

interface Setting {
  seed: number;
  scenario?: ScenarioInput;
  parameters?: ParametersInput;
  outages?: Outage[];
  change?: (simulated: SimulatedCase) => void;
}

function run({ seed, scenario, parameters, outages = [], change }: Setting): RunResult {
  const simulated = simulateCase({ ...ROAD, ...scenario, seed }, parameters);
  change?.(simulated);
  const filter = createRun(simulated.recording, requestOf(simulated, { outages }));
  while (!filter.advance(1e6));
  return filter.finish();
}

const percent = (share: number) => `${(100 * share).toFixed(2)} %`;
const rmse = (result: RunResult) => result.summary.truth!.positionRmseM;
const each = (title: string, line: (seed: number) => string) => {
  console.log(title);
  for (const seed of seeds) console.log(`  seed ${seed}: ${line(seed)}`);
};

const clean = new Map(seeds.map((seed) => [seed, run({ seed })]));

each('Clean fixes, gate at 99.9 %: rejected', (seed) => {
  const { position, velocity } = clean.get(seed)!;
  const verdicts = [...position.accepted, ...velocity.accepted];
  const rejected = verdicts.filter((ok) => ok === 0).length;
  return `${rejected} of ${verdicts.length}: ${percent(rejected / verdicts.length)}`;
});

const spoilt = new Map(
  seeds.map((seed) => [seed, run({ seed, scenario: { gnss: { outlierShare: 0.02, outlierSigmas: 50 } } })]),
);
each('2 % outliers of 50 σ: RMS position error of the aided solution', (seed) => {
  const [before, after] = [rmse(clean.get(seed)!), rmse(spoilt.get(seed)!)];
  const rejected = sum(spoilt.get(seed)!.summary.groups.map((g) => g.rejected));
  return `${before.toFixed(3)} m → ${after.toFixed(3)} m: ${percent(after / before - 1)}, ${rejected} rejected`;
});
const pooled = (results: Map<number, RunResult>) =>
  Math.sqrt(sum([...results.values()].map((r) => rmse(r) ** 2)));
console.log(`  all drives together: ${percent(pooled(spoilt) / pooled(clean) - 1)}`);

each('Ten minutes without GNSS, then the first fixes', (seed) => {
  const result = run({
    seed,
    scenario: { durationS: 800, imuRateHz: 50 },
    outages: [{ startS: 120, endS: 720, withhold: 'gnss' }],
  });
  const first = result.position.timeS.findIndex((t) => t >= 720);
  const verdicts = [...result.position.accepted.slice(first, first + 5)].map((ok) =>
    ok === 1 ? 'taken' : 'refused',
  );
  const miss = Math.hypot(result.position.innovation[0][first]!, result.position.innovation[1][first]!);
  return `${miss.toFixed(0)} m off (1σ ${result.position.sigma[0][first]!.toFixed(0)} m north): ${verdicts.join(', ')}`;
});

each('Initial heading wrong: heading error at the end, and what is reported', (seed) =>
  [30, 90, 180]
    .map((deg) => {
      const wrong = run({ seed, parameters: { initial: { headingDeg: 35 + deg } } });
      const yaw = wrong.solution.yaw_deg!.at(-1)! - clean.get(seed)!.solution.yaw_deg!.at(-1)!;
      const told = [...new Set(wrong.summary.warnings.map((w) => w.code))].join(', ') || 'nothing';
      return `by ${deg}°: ${Math.abs(((yaw + 540) % 360) - 180).toFixed(2)}° (${told})`;
    })
    .join('   '),
);

each('Shock of 80 m/s² for 30 ms, range 30 m/s², then 30 s without GNSS: horizontal error', (seed) =>
  [true, false]
    .map((enabled) => {
      const coasting = run({
        seed,
        scenario: { durationS: 160 },
        parameters: { clipping: { enabled, accelRangeMPerS2: 30 } },
        outages: [{ startS: 99.8, endS: 130, withhold: 'gnss' }],
        change: ({ recording }) =>
          addShock(recording, { atS: 99.9, samples: 3, shockMPerS2: 80, rangeMPerS2: 30 }),
      });
      const { horizontalM, predictedHorizontalM: sigma } = coasting.summary.outages[0]!.points.at(-1)!;
      return `${enabled ? 'with' : 'without'} the clipping policy ${horizontalM.toFixed(1)} m, predicted ${sigma.toFixed(1)} m: ${(horizontalM / sigma).toFixed(1)} σ`;
    })
    .join('   '),
);

each('Covariance at 20 Hz against every sample: largest difference over the run', (seed) => {
  const fine = run({ seed, parameters: { mechanisation: { covarianceIntervalS: 0 } } });
  const coarse = clean.get(seed)!;
  const apart = (name: string) =>
    Math.max(...fine.solution[name]!.map((x, i) => Math.abs(x - coarse.solution[name]![i]!)));
  const share = (name: string) =>
    Math.max(...fine.solution[name]!.map((x, i) => Math.abs(coarse.solution[name]![i]! / x - 1)));
  const sigmas = Object.keys(fine.solution).filter((name) => name.startsWith('sigma_'));
  return `north ${(apart('lat_deg') * 111_200).toExponential(1)} m, yaw ${apart('yaw_deg').toExponential(1)}°, any 1σ by ${Math.max(...sigmas.map(share)).toExponential(1)} of itself`;
});

each('The same input twice: SHA-256 of all tables', (seed) => {
  const [first, second] = [clean.get(seed)!, run({ seed })].map(digest);
  return `${first!.slice(0, 16)}… ${first === second ? 'equals' : 'DIFFERS FROM'} ${second!.slice(0, 16)}…`;
});

function digest(result: RunResult): string {
  const hash = createHash('sha256');
  for (const column of Object.values(result.solution)) hash.update(column);
  for (const { timeS, innovation, sigma, nis, accepted } of [result.position, result.velocity])
    for (const column of [timeS, ...innovation, ...sigma, nis, accepted]) hash.update(column);
  return hash.digest('hex');
}

function sum(values: number[]): number {
  return values.reduce((total, value) => total + value, 0);
}
