/** What a verdict hangs on, hashed, so that it is known which verdicts still hold and why others do not. */
import { ENGINE_VERSION, sha256OfJson } from '@/workers';
import type { SetVersion } from '../models/parameter-set';
import type { Recording } from '../models/recording';
import type { Requirement } from '../models/requirement';
import type { Definition, VerificationInputs } from '../models/verification';

export const hashOf = (value: Definition | VerificationInputs): string => sha256OfJson(value);

export const definitionOf = ({ metric, comparison, limitValue, schedule }: Requirement): Definition => ({
  metric,
  comparison,
  limit: limitValue,
  schedule,
});

/** What a run for `version` over `recording` would be made from just now. */
export function inputsOf(
  { parameters }: SetVersion,
  recording: Recording,
  { schedule }: Requirement,
): VerificationInputs {
  const leverArmM = parameters.leverArmM ?? recording.vehicle?.leverArmM ?? [0, 0, 0];
  return {
    recordingSha256: recording.status === 'ready' ? (recording.sha256 ?? null) : null,
    parametersSha256: sha256OfJson({ ...parameters, leverArmM }),
    leverArmM,
    schedule,
    engineVersion: ENGINE_VERSION,
  };
}

/** Why what was judged by `then` no longer holds for `now`, each a clause for a sentence; empty: it holds. */
export function whatChanged(
  now: { inputs: VerificationInputs; definition: Definition },
  then: { inputs: VerificationInputs; definition: Definition },
): string[] {
  const reasons: string[] = [];
  const [a, b] = [then.inputs, now.inputs];
  if (a.recordingSha256 !== b.recordingSha256) {
    reasons.push(
      b.recordingSha256 === null
        ? 'the recording is no longer decoded'
        : 'the recording was decoded again, with another result',
    );
  }
  const movedArm = !same(a.leverArmM, b.leverArmM);
  if (movedArm) reasons.push('the lever arm was changed');
  if (!movedArm && a.parametersSha256 !== b.parametersSha256) reasons.push('the parameters were changed');
  if (!same(a.schedule, b.schedule)) reasons.push('the outage schedule was changed');
  if (a.engineVersion !== b.engineVersion) {
    reasons.push(`the engine is version ${b.engineVersion} now, and was ${a.engineVersion}`);
  }
  const asks = ({ metric, comparison, limit }: Definition) => ({ metric, comparison, limit });
  if (!same(asks(then.definition), asks(now.definition))) reasons.push('the requirement was changed');
  return reasons;
}

const same = (a: unknown, b: unknown) => sha256OfJson(a) === sha256OfJson(b);
