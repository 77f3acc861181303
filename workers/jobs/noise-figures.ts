/** What the filter takes of a noise analysis, and what to know of it. */
import type { NoiseTerm } from '@/shared/contracts/noise';
import type { SensorFigures } from '@/shared/contracts/vehicles';
import { formatDuration } from '@/shared/format';
import type { NoiseAnalysis } from '../engine/allan/analysis';
import { noiseStartValues, type NoiseStartValues } from '../engine/allan/start-values';

/** Of the noisiest axis: one figure serves all three, and an over-sure filter is worse than a cautious one. */
export function figuresOf(analyses: readonly NoiseAnalysis[]): SensorFigures {
  const values = analyses.map(noiseStartValues);
  const gyro = noisiest(values.slice(0, 3));
  const accel = noisiest(values.slice(3));
  return {
    gyro: {
      whiteNoiseRadPerSqrtS: gyro.whiteNoise,
      biasInstabilityRadPerS: gyro.biasInstability,
      biasCorrelationTimeS: gyro.biasCorrelationTimeS,
      turnOnBiasSigmaRadPerS: null,
      biasRandomWalkRadPerSPerSqrtS: gyro.biasRandomWalk,
    },
    accel: {
      whiteNoiseMPerSPerSqrtS: accel.whiteNoise,
      biasInstabilityMPerS2: accel.biasInstability,
      biasCorrelationTimeS: accel.biasCorrelationTimeS,
      turnOnBiasSigmaMPerS2: null,
      biasRandomWalkMPerS2PerSqrtS: accel.biasRandomWalk,
    },
  };
}

/** σ and τ of the wander belong together: they come from the axis that wanders most. */
function noisiest(axes: readonly NoiseStartValues[]): NoiseStartValues {
  const wander = axes.reduce((a, b) => ((b.biasInstability ?? 0) > (a.biasInstability ?? 0) ? b : a));
  return {
    whiteNoise: largest(axes.map((axis) => axis.whiteNoise)),
    biasInstability: wander.biasInstability,
    biasCorrelationTimeS: wander.biasCorrelationTimeS,
    biasRandomWalk: largest(axes.map((axis) => axis.biasRandomWalk)),
  };
}

function largest(values: readonly (number | null)[]): number | null {
  const known = values.filter((value) => value !== null);
  return known.length > 0 ? Math.max(...known) : null;
}

/** Terms that people look for, and about how long a record must be to show them on a common MEMS sensor. */
const SOUGHT: readonly { term: NoiseTerm; words: string; advice: string }[] = [
  { term: 'white', words: 'white noise', advice: 'Something louder hides it: is an engine running?' },
  { term: 'biasInstability', words: 'bias instability', advice: 'Record for an hour or more.' },
  { term: 'rateRandomWalk', words: 'rate random walk', advice: 'Record for several hours.' },
];

/** Plain sentences; `cut`: only a part of the stretch could be used. */
export function notesOf(analyses: readonly NoiseAnalysis[], cut: boolean): string[] {
  const notes = SOUGHT.flatMap(({ term, words, advice }) => {
    const hidden = ['gyro', 'accelerometer'].flatMap((sensor, s) => {
      const axes = [...'xyz'].filter((_, i) => !analyses[3 * s + i]!.terms[term].observable);
      return axes.length > 0 ? [`${sensor} ${axes.join(', ')}`] : [];
    });
    if (hidden.length === 0) return [];
    const length = formatDuration(analyses[0]!.durationS);
    return [`${length} at rest cannot tell the ${words} of ${hidden.join(' and ')}. ${advice}`];
  });
  if (cut) notes.push('The stretch has gaps: its longest part without one was taken.');
  notes.push('A turn-on bias shows only over several starts: take it from the datasheet.');
  return notes;
}
