/** Mean rates with known noise terms, for tests. */
import { scaleForInterval, unitSeries } from '@/workers/engine/allan/synthesis';
import { NO_TERMS, TERM_NAMES, type TermValues } from '@/workers/engine/allan/terms';
import { createRandom } from '@/workers/engine/random';

export function noiseSeries(
  terms: Partial<TermValues>,
  count: number,
  intervalS: number,
  seed: number,
): Float64Array {
  const values = { ...NO_TERMS, ...terms };
  const random = createRandom(seed);
  const out = new Float64Array(count);
  for (const term of TERM_NAMES) {
    if (values[term] === 0) continue;
    const scale = values[term] * scaleForInterval(term, intervalS);
    unitSeries(term, count, random.split(term)).forEach((value, k) => {
      out[k]! += scale * value;
    });
  }
  return out;
}
