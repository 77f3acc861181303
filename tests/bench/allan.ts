/** Prints how long the noise analysis of a long static log takes: `npm run bench -- allan [hours]`. */
import { analyseNoise } from '@/workers/engine/allan/analysis';
import { noiseSeries } from '@/tests/support/noise-series';

const hours = Number(process.argv[2] ?? '4');
const intervalS = 1 / 200;
const truth = { white: 8.7e-5, biasInstability: 2e-5, rateRandomWalk: 1e-6 };
const count = hours * 3600 * 200;
let spent = 0;
for (let axis = 0; axis < 6; axis += 1) {
  const rates = noiseSeries(truth, count, intervalS, axis);
  const cpu = process.cpuUsage().user;
  const began = performance.now();
  const { terms, points } = analyseNoise(rates, intervalS);
  const wallS = (performance.now() - began) / 1000;
  const cpuS = (process.cpuUsage().user - cpu) / 1e6;
  spent += cpuS;
  const shown = Object.values(terms).map(({ term, value, sigma }) =>
    value === null
      ? `${term} not observable`
      : `${term} ${value.toExponential(2)} ± ${sigma!.toExponential(0)}`,
  );
  console.log(
    `axis ${axis + 1}: ${cpuS.toFixed(2)} s (${wallS.toFixed(2)} s by the clock), ${points.length} points; ${shown.join(', ')}`,
  );
}
console.log(`${hours} h at 200 Hz, 6 axes: ${spent.toFixed(1)} s of processor time`);
