/** Findings on outage windows: is the error while coasting what the covariance predicted? */
import type { RunFinding, RunSummary } from '@/shared/contracts/runs';
import { formatNumber } from '@/shared/format';
import type { Run } from './run';

/** Windows needed before their RMS is judged. */
const MIN_WINDOWS = 4;
/** A single window is named when its error is this many predicted 1σ. */
const SINGLE_SIGMAS = 3;

export function coastingFindings(summary: Omit<RunSummary, 'findings'>, run: Run): RunFinding[] {
  const ends = summary.outages
    .map((outage) => ({ outage, end: outage.points.at(-1) }))
    .filter(({ end }) => end !== undefined && end.predictedHorizontalM > 0);
  const ratios = ends.map(({ end }) => end!.horizontalM / end!.predictedHorizontalM);
  if (ratios.length >= MIN_WINDOWS) {
    const rms = Math.sqrt(ratios.reduce((sum, r) => sum + r * r, 0) / ratios.length);
    // 95 % interval of an RMS of 2-vectors of that many windows, about.
    const spread = 1.4 / Math.sqrt(ratios.length);
    if (rms > 1 + spread) return [tooSure(rms, ratios.length, run)];
    if (rms < 1 - Math.min(0.6, spread)) return [tooCautious(rms, ratios.length)];
    return [];
  }
  return ends.flatMap(({ outage, end }, i) =>
    ratios[i]! > SINGLE_SIGMAS
      ? [
          {
            code: 'coasting-beyond',
            severity: 'warn' as const,
            title: 'Coasting error beyond 3σ',
            sentence: `After ${formatNumber(end!.afterS)} s without GNSS the horizontal error is ${formatNumber(end!.horizontalM)} m, ${formatNumber(ratios[i]!, 2)} times the predicted ${formatNumber(end!.predictedHorizontalM)} m.`,
            suggestion: null,
            intervalS: [outage.startS, outage.endS] as [number, number],
          },
        ]
      : [],
  );
}

function tooSure(rms: number, windows: number, run: Run): RunFinding {
  const { biasModel } = run.request.parameters.gyro;
  const model =
    biasModel === 'gauss-markov'
      ? ' A bias that decays to zero forgets a turn-on constant: try the turn-on plus wander model.'
      : '';
  return {
    code: 'coasting-too-sure',
    severity: 'warn',
    title: 'Coasting errors are larger than predicted',
    sentence: `Over ${windows} windows the horizontal error is ${formatNumber(rms, 2)} times its predicted σ: gyro and accelerometer noise or bias wander are set too low.${model}`,
    suggestion: null,
    intervalS: null,
  };
}

function tooCautious(rms: number, windows: number): RunFinding {
  return {
    code: 'coasting-too-cautious',
    severity: 'info',
    title: 'Coasting errors are smaller than predicted',
    sentence: `Over ${windows} windows the horizontal error is only ${formatNumber(rms, 2)} of its predicted σ: gyro and accelerometer noise or bias wander may be set too high.`,
    suggestion: null,
    intervalS: null,
  };
}
