/**
 * A search on a simulated drive whose sensors are known, from start values wrong by a factor of three: prints what it
 * recovers as JSON. `[seed] [survey|standalone]`: the receiver.
 */
import { parametersSchema, type Parameters } from '@/shared/contracts/parameters';
import { scenarioSchema, type GnssErrors } from '@/shared/contracts/scenarios';
import {
  createSearch,
  type SearchRequest,
  type SearchResult,
  type TunableName,
} from '@/workers/engine/search';
import { imuModel, simulateScenario } from '@/workers/engine/simulator/scenario';

/** Carrier-phase fixes tell the IMU's noise; code fixes are too coarse to tell the accelerometers' in twenty minutes. */
const RECEIVERS: Record<string, Partial<GnssErrors>> = {
  survey: {
    positionSigmaHorizontalM: 0.01,
    positionSigmaVerticalM: 0.015,
    velocitySigmaHorizontalMPerS: 0.02,
    velocitySigmaVerticalMPerS: 0.03,
  },
  standalone: {
    positionSigmaHorizontalM: 1.5,
    positionSigmaVerticalM: 2.5,
    velocitySigmaHorizontalMPerS: 0.1,
    velocitySigmaVerticalMPerS: 0.15,
  },
};
const WRONG: Partial<Record<TunableName, number>> = {
  gyroWhiteNoise: 3,
  accelWhiteNoise: 1 / 3,
  positionScale: 1 / 3,
  velocityScale: 3,
};

export interface Recovery {
  seed: number;
  /** Tuned ÷ true, and 1σ as the search gives it, percent. */
  values: { name: string; ratio: number; sigmaPercent: number | null; standing: string }[];
  perGroup: { training: [number, number]; heldOut: [number, number]; truth: [number, number] };
  evaluations: number;
  converged: boolean;
  processorS: number;
}

function recover(seed: number, receiver: string): Recovery {
  const scenario = scenarioSchema.parse({
    motion: 'road',
    // Twenty minutes train, the last two judge.
    durationS: 1320,
    imuRateHz: 50,
    gnssRateHz: 5,
    imuGrade: 'consumer',
    seed,
    gnss: RECEIVERS[receiver],
  });
  const truth = trueParameters();
  const parameters = structuredClone(truth);
  parameters.gyro.whiteNoiseRadPerSqrtS *= WRONG.gyroWhiteNoise!;
  parameters.accel.whiteNoiseMPerSPerSqrtS *= WRONG.accelWhiteNoise!;
  parameters.gnss.positionScale *= WRONG.positionScale!;
  parameters.gnss.velocityScale *= WRONG.velocityScale!;
  const recording = simulateScenario(scenario);
  const source = {
    recording,
    leverArmM: scenario.leverArmM,
    trainingS: [[0, 1200]] as const,
    heldOutS: [[1200, 1321]] as const,
  };
  const names = Object.keys(WRONG) as TunableName[];
  const began = process.cpuUsage().user;
  const tuned = names.map((name) => ({ name }));
  const result = searched({ cases: [source], parameters, tuned });
  const processorS = (process.cpuUsage().user - began) / 1e6;
  const right = searched({ cases: [source], parameters: truth, tuned: tuned.slice(0, 1), evaluations: 1 });
  const known = [truth.gyro.whiteNoiseRadPerSqrtS, truth.accel.whiteNoiseMPerSPerSqrtS, 1, 1];
  const { training, heldOut } = result;
  return {
    seed,
    values: result.tuned.map(({ name, value, sigmaPercent, standing }, i) => ({
      name,
      ratio: value / known[i]!,
      sigmaPercent,
      standing,
    })),
    perGroup: {
      training: [training.start.perGroup, training.tuned.perGroup],
      heldOut: [heldOut!.start.perGroup, heldOut!.tuned.perGroup],
      truth: [right.training.start.perGroup, right.heldOut!.start.perGroup],
    },
    evaluations: result.evaluations,
    converged: result.converged,
    processorS,
  };
}

function searched(request: SearchRequest): SearchResult {
  const search = createSearch(request);
  while (!search.advance(1e6));
  return search.finish();
}

/** The filter's parameters that describe the simulated sensors exactly, their quantisation included. */
function trueParameters(): Parameters {
  const model = imuModel('consumer');
  const white = (density: number, step: number) => Math.hypot(density, step / Math.sqrt(12 * 50));
  return parametersSchema.parse({
    gyro: {
      whiteNoiseRadPerSqrtS: white(model.gyroWhiteNoiseRadPerSqrtS, model.gyroStepRadPerS),
      biasInstabilityRadPerS: model.gyroBiasInstabilityRadPerS,
      biasCorrelationTimeS: model.gyroBiasCorrelationTimeS,
      turnOnBiasSigmaRadPerS: model.gyroTurnOnBiasSigmaRadPerS,
    },
    accel: {
      whiteNoiseMPerSPerSqrtS: white(model.accelWhiteNoiseMPerSPerSqrtS, model.accelStepMPerS2),
      biasInstabilityMPerS2: model.accelBiasInstabilityMPerS2,
      biasCorrelationTimeS: model.accelBiasCorrelationTimeS,
      turnOnBiasSigmaMPerS2: model.accelTurnOnBiasSigmaMPerS2,
    },
    gnss: { positionFloorM: 0.001, velocityFloorMPerS: 0.001 },
  });
}

const [seed = '1', receiver = 'survey'] = process.argv.slice(2);
console.log(JSON.stringify(recover(Number(seed), receiver)));
