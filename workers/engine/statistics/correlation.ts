/** Correlation of a series with itself. */
import { chiSquaredUpper, normalQuantile } from './distributions';

/** Autocorrelation at lags 1…maxLag: mean removed, divisor n (Box & Jenkins). NaN for a constant series. */
export function autocorrelation(x: ArrayLike<number>, maxLag: number): Float64Array {
  const n = x.length;
  let mean = 0;
  for (let i = 0; i < n; i += 1) mean += x[i]!;
  mean /= n;
  let c0 = 0;
  for (let i = 0; i < n; i += 1) c0 += (x[i]! - mean) ** 2;
  const r = new Float64Array(maxLag);
  for (let lag = 1; lag <= maxLag; lag += 1) {
    let c = 0;
    for (let i = lag; i < n; i += 1) c += (x[i]! - mean) * (x[i - lag]! - mean);
    r[lag - 1] = c / c0;
  }
  return r;
}

/** Half-width of the band in which a white series' sample autocorrelation lies with probability `level`. */
export function autocorrelationBand(count: number, level = 0.95): number {
  return normalQuantile((1 + level) / 2) / Math.sqrt(count);
}

/** Portmanteau test for whiteness over lags 1…lags (Ljung & Box, Biometrika 65, 1978): statistic and p-value. */
export function ljungBox(x: ArrayLike<number>, lags: number): { statistic: number; p: number } {
  const n = x.length;
  const r = autocorrelation(x, lags);
  let sum = 0;
  for (let k = 1; k <= lags; k += 1) sum += r[k - 1]! ** 2 / (n - k);
  const statistic = n * (n + 2) * sum;
  return { statistic, p: chiSquaredUpper(statistic, lags) };
}

/** Factor on the variance of the mean of a first-order autoregressive series with lag-1 correlation ρ: (1+ρ)/(1−ρ). */
export function meanVarianceFactor(rho: number): number {
  return (1 + rho) / (1 - rho);
}
