/** Sensor noise of a recording: all stretches at rest, and the Allan analysis of one of them. */
import type { NoiseAnalysis, NoiseAxis } from '@/shared/contracts/noise';
import { formatNumber } from '@/shared/format';
import { analyseNoise, MIN_SAMPLES, type NoiseAnalysis as AxisAnalysis } from '../engine/allan/analysis';
import type { ImuColumns } from '../engine/types';
import { JobFailed, type NoiseJob } from '../protocol';
import type { JobHelpers } from './helpers';
import { figuresOf, notesOf } from './noise-figures';
import { steadyPart, stretchesAtRest, type Rows } from './rest-stretches';
import { firstAfter, firstAtLeast } from './time-rows';

export const NOISE_CHANNELS = ['gyro_x', 'gyro_y', 'gyro_z', 'accel_x', 'accel_y', 'accel_z'] as const;

/** Throws JobFailed 'no-rest' where nothing is at rest, 'too-short' where the stretch has too few samples. */
export async function noise(job: NoiseJob, helpers: JobHelpers): Promise<NoiseAnalysis> {
  const { columns } = await helpers.recordings.load(job.recordingId);
  const { imu } = columns;
  const stretches = await stretchesAtRest(columns, helpers);
  const wanted = job.spanS ? rowsWithin(imu, job.spanS) : stretches[0];
  if (!wanted) throw new JobFailed('no-rest', NO_REST);
  const rows = steadyPart(imu.timeS, wanted);
  const samples = rows.to - rows.from;
  if (samples < MIN_SAMPLES) throw new JobFailed('too-short', tooShort(samples));
  const [fromS, toS] = [imu.timeS[rows.from]!, imu.timeS[rows.to]!];
  const intervalS = (toS - fromS) / samples;
  const analyses: AxisAnalysis[] = [];
  for (const axis of [...imu.gyro, ...imu.accel]) {
    analyses.push(analyseNoise(ratesOf(imu, axis, rows), intervalS));
    helpers.progress(analyses.length / NOISE_CHANNELS.length);
    await helpers.breathe();
  }
  return {
    fromS,
    toS,
    samples,
    intervalS,
    stretchesS: stretches.map(({ from, to }) => [imu.timeS[from]!, imu.timeS[to]!]),
    notes: notesOf(analyses, samples < wanted.to - wanted.from),
    axes: analyses.map(axisOf),
    figures: figuresOf(analyses),
  };
}

const NO_REST =
  'No stretch at rest was found. Choose one in which the vehicle stands still with its engine off, or record the sensor lying still for an hour or more.';
const tooShort = (samples: number) =>
  `The stretch holds ${formatNumber(samples)} samples without a gap; a noise analysis needs at least ${MIN_SAMPLES}. Choose a longer one.`;

function rowsWithin({ timeS }: ImuColumns, [fromS, toS]: readonly [number, number]): Rows {
  const from = firstAtLeast(timeS, fromS);
  return { from, to: Math.max(from, firstAfter(timeS, toS) - 1) };
}

/** Mean rates of the samples after `from` up to `to`. */
function ratesOf({ sampling, timeS }: ImuColumns, axis: Float64Array, { from, to }: Rows): Float64Array {
  const values = axis.slice(from + 1, to + 1);
  if (sampling === 'increment')
    for (let i = 0; i < values.length; i += 1) values[i]! /= timeS[from + 1 + i]! - timeS[from + i]!;
  return values;
}

function axisOf({ points, terms }: AxisAnalysis, i: number): NoiseAxis {
  const term = ({ value, sigma }: AxisAnalysis['terms']['white']) => ({ value, sigma });
  return {
    channel: NOISE_CHANNELS[i]!,
    unit: i < 3 ? 'rad/s' : 'm/s²',
    points: points.map(({ tauS, deviation, low, high, model }) => ({ tauS, deviation, low, high, model })),
    terms: {
      quantisation: term(terms.quantisation),
      white: term(terms.white),
      biasInstability: term(terms.biasInstability),
      rateRandomWalk: term(terms.rateRandomWalk),
      ramp: term(terms.ramp),
    },
  };
}
