/**
 * Allan curves of seeded series with any mixture of terms. A series with coefficients c is the sum of unit series, so
 * its Allan variance is a quadratic form in c: the products of the unit series' second differences are formed once and
 * serve every mixture.
 */
import { createRandom } from '../random';
import { logSpacedClusters, type AllanPoint } from './deviation';
import { scaleForInterval, unitSeries } from './synthesis';
import { TERM_NAMES, type TermValues } from './terms';

/** Local names: a global looked up in each call costs more than the call. */
const { max, sqrt } = Math;

/** Samples that stand for a whole record, and series that were drawn. */
export const REPLICATE_SAMPLES = 2048;
export const REPLICATES = 120;
/** Clusters below this are left to the measured points' own degrees of freedom. */
const SMALLEST = 4;
const PAIRS = (TERM_NAMES.length * (TERM_NAMES.length + 1)) / 2;

interface Table {
  clusters: number[];
  /** Mean products by replicate, cluster, pair of terms. */
  products: Float64Array;
}
let table: Table | null = null;

/** The curve of replicate r for a record of `durationS`, at the clusters from SMALLEST on. */
export function replicateCurve(values: TermValues, durationS: number, r: number): AllanPoint[] {
  table ??= makeTable();
  const { clusters, products } = table;
  const intervalS = durationS / REPLICATE_SAMPLES;
  const c = TERM_NAMES.map((term) => values[term] * scaleForInterval(term, intervalS));
  return clusters.map((m, k) => {
    let sum = 0;
    let at = (r * clusters.length + k) * PAIRS;
    for (let i = 0; i < c.length; i += 1)
      for (let j = 0; j <= i; j += 1) {
        sum += (i === j ? 1 : 2) * c[i]! * c[j]! * products[at]!;
        at += 1;
      }
    const terms = REPLICATE_SAMPLES + 1 - 2 * m;
    return { m, tauS: m * intervalS, deviation: sqrt(max(sum, 0) / 2) / m, terms };
  });
}

function makeTable(): Table {
  const clusters = logSpacedClusters(REPLICATE_SAMPLES).filter((m) => m >= SMALLEST);
  const products = new Float64Array(REPLICATES * clusters.length * PAIRS);
  const root = createRandom(20_250_101);
  let at = 0;
  for (let r = 0; r < REPLICATES; r += 1) {
    const random = root.split(`replicate-${r}`);
    const phases = TERM_NAMES.map((term) =>
      cumulative(unitSeries(term, REPLICATE_SAMPLES, random.split(term))),
    );
    for (const m of clusters) {
      const differences = phases.map((x) => secondDifferences(x, m));
      for (let i = 0; i < differences.length; i += 1)
        for (let j = 0; j <= i; j += 1) {
          products[at] = meanProduct(differences[i]!, differences[j]!);
          at += 1;
        }
    }
  }
  return { clusters, products };
}

function cumulative(rates: Float64Array): Float64Array {
  const phase = new Float64Array(rates.length + 1);
  for (let k = 0; k < rates.length; k += 1) phase[k + 1] = phase[k]! + rates[k]!;
  return phase;
}

function secondDifferences(x: Float64Array, m: number): Float64Array {
  const out = new Float64Array(x.length - 2 * m);
  for (let i = 0; i < out.length; i += 1) out[i] = x[i + 2 * m]! - 2 * x[i + m]! + x[i]!;
  return out;
}

function meanProduct(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i += 1) sum += a[i]! * b[i]!;
  return sum / a.length;
}
