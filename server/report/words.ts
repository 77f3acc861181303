/** What a report says of itself: its summary, how it was made, what it rests on. */
import type { Report } from '@/shared/contracts/report';
import { formatNumber } from '@/shared/format';

type Told = Pick<Report, 'set' | 'version' | 'vehicle' | 'matrix' | 'runs' | 'notice'>;

/** Sentences for who reads nothing else. */
export function summaryOf({ set, version, vehicle, matrix, runs, notice }: Told): string[] {
  return [
    notice,
    `${set.name}, version ${version.number}${vehicle ? `, for ${vehicle.name}` : ''}: ${version.note}`,
    verified(matrix),
    ...drifts(runs),
  ];
}

function verified({
  cells,
  requirements,
  recordings,
  withoutRequirements,
  asReleased,
}: Report['matrix']): string {
  if (withoutRequirements) return `Released without requirements: ${withoutRequirements}`;
  if (cells.length === 0) return 'No requirement applies: nothing was verified.';
  const count = (is: (cell: (typeof cells)[number]) => boolean) => cells.filter(is).length;
  const passed = count(({ verdict, outOfDate }) => verdict === 'pass' && outOfDate.length === 0);
  const waived = count(({ waiver }) => waiver !== null);
  const open = count(({ settled }) => !settled);
  const parts = [
    `${passed} of ${cells.length} cells pass`,
    waived > 0 ? `${waived} waived in writing` : '',
    open > 0 ? `${open} stand open` : '',
  ];
  const what = `${requirements.length} requirements on ${recordings.length} recordings`;
  return `Verified against ${what}${asReleased ? ', as it stood at the release' : ''}: ${parts.filter(Boolean).join(', ')}.`;
}

/** The worst of the recordings after a minute, where there is one. */
function drifts(runs: Report['runs']): string[] {
  const found = runs.flatMap(({ recordingName, drift }) =>
    drift.filter(({ afterS }) => afterS === 60).map((at) => ({ recordingName, ...at })),
  );
  if (found.length === 0) return [];
  const worst = found.reduce((most, one) => (one.p95M > most.p95M ? one : most));
  const { p95M, recordingName, windows, ratio } = worst;
  return [
    `After 60 s without GNSS the horizontal drift stays below ${formatNumber(p95M)} m in 95 % of windows on every recording (the most on ${recordingName}, ${windows} windows; actual ÷ predicted ${formatNumber(ratio)}).`,
  ];
}

export const METHOD: readonly string[] = [
  'Error-state extended Kalman filter over strapdown navigation in north–east–down on WGS-84, with coning and sculling corrections, biases of gyro and accelerometer as states.',
  'Consistency: normalised innovation squared (NIS) of position and velocity against its two-sided 95 % χ² bounds; innovation whiteness by lag-1 autocorrelation.',
  'Drift: GNSS is withheld in the stated windows. The coasting solution is compared with truth where the recording has it, else with the fully aided solution. Percentiles by linear interpolation of the order statistics.',
  'Predicted drift: √(P_NN + P_EE) of the filter’s covariance at the same instant, RMS over the windows.',
  'A run stores the hashes of its inputs, its parameters and the engine’s version; the same run gives the same bytes.',
];

export const REFERENCES: readonly string[] = [
  'D. H. Titterton, J. L. Weston: Strapdown Inertial Navigation Technology, 2nd ed., 2004.',
  'P. D. Groves: Principles of GNSS, Inertial, and Multisensor Integrated Navigation Systems, 2nd ed., 2013.',
  'Y. Bar-Shalom, X. R. Li, T. Kirubarajan: Estimation with Applications to Tracking and Navigation, 2001 (NIS, NEES).',
  'R. J. Hyndman, Y. Fan: Sample Quantiles in Statistical Packages, The American Statistician 50, 1996 (definition 7).',
  'IEEE Std 952: single-axis interferometric fiber optic gyros (Allan variance).',
];
