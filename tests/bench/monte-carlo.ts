/**
 * Prints the filter's consistency over many seeded runs: `npm run bench -- monte-carlo [runs] [part of a title]`.
 */
import { averageBounds, sigmaInterval } from '@/workers/engine/statistics/consistency';
import { mean, standardDeviation } from '@/workers/engine/statistics/descriptive';
import {
  BLOCK_NAMES,
  monteCarlo,
  type MonteCarloCase,
  type MonteCarloResult,
} from '@/tests/support/monte-carlo';

const outagesS = [
  [300, 420],
  [480, 600],
] as const;
const common = {
  durationS: 605,
  imuRateHz: 100,
  gnssRateHz: 5,
  staticStartS: 30,
  leverArmM: [0.3, -0.2, -1.1] as [number, number, number],
};
const scenarios: Pick<MonteCarloCase, 'name' | 'scenario'>[] = [
  { name: 'road, consumer', scenario: { ...common, motion: 'road', imuGrade: 'consumer' } },
  { name: 'road, industrial', scenario: { ...common, motion: 'road', imuGrade: 'industrial' } },
  { name: 'crawler, industrial', scenario: { ...common, motion: 'crawler', imuGrade: 'industrial' } },
  { name: 'fixed-wing, tactical', scenario: { ...common, motion: 'fixed-wing', imuGrade: 'tactical' } },
  { name: 'multirotor, industrial', scenario: { ...common, motion: 'multirotor', imuGrade: 'industrial' } },
];

const [runs = '100', part = ''] = process.argv.slice(2);
const variants = [
  { start: 'given', wander: 'random-walk' },
  { start: 'given', wander: 'gauss-markov' },
  { start: 'found', wander: 'gauss-markov' },
] as const;
for (const { name, scenario } of scenarios)
  for (const { start, wander } of variants) {
    const title = `${name}, bias wander ${wander}, start ${start}`;
    if (!title.includes(part)) continue;
    const began = performance.now();
    const result = monteCarlo(
      { name, scenario, start, wander, outagesS, settleS: 120, smooth: true },
      Number(runs),
    );
    print(`${title}, ${runs} runs of ${scenario.durationS} s`, result);
    console.log(`  ${((performance.now() - began) / 1000).toFixed(0)} s\n`);
  }

function print(title: string, result: MonteCarloResult): void {
  console.log(title);
  for (const failure of result.failures) console.log(`  FAILED ${failure}`);
  for (const [title, nees] of [
    ['NEES ', result.nees],
    ['smoothed', result.smoothedNees],
  ] as const)
    for (const block of BLOCK_NAMES) {
      const values = nees[block];
      const [low, high] = averageBounds(values.length, block === 'all' ? 15 : 3);
      console.log(
        `  ${title} ${block.padEnd(10)}${figure(values)}   one epoch of all runs: [${low.toFixed(2)}, ${high.toFixed(2)}]`,
      );
    }
  for (const group of ['position', 'velocity'] as const)
    console.log(`  NIS  ${group.padEnd(10)}${figure(result.nis[group])}`);
  console.log(
    `  rejected ${result.rejected} of ${result.measured}: ${((100 * result.rejected) / result.measured).toFixed(3)} %`,
  );
  for (const [after, list] of [...result.drift].sort((a, b) => a[0] - b[0])) {
    const actual = Math.sqrt(mean(list.map((d) => d.actual ** 2)));
    const predicted = Math.sqrt(mean(list.map((d) => d.predicted ** 2)));
    const inside = list.filter((d) => d.actual <= d.predicted).length / list.length;
    const spread = sigmaInterval(list.length).map((x) => x.toFixed(2));
    console.log(
      `  after ${String(after.toFixed(0)).padStart(3)} s: ${actual.toFixed(2)} m rms, ${predicted.toFixed(2)} m predicted, ratio ${(actual / predicted).toFixed(3)} (one axis: ${spread.join('–')}), ${(100 * inside).toFixed(0)} % inside 1σ, ${list.length} windows`,
    );
  }
}

/** Mean over the runs and its standard error. */
function figure(values: number[]): string {
  return `${mean(values).toFixed(3)} ± ${(standardDeviation(values) / Math.sqrt(values.length)).toFixed(3)}`;
}
